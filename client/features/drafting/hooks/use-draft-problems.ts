import { useCallback, useDeferredValue, useMemo, useState } from 'react';
import { checkLotDraft, type LotProblem } from '#shared/lot-submission.ts';
import { lotDraft, type LotDraft } from '#shared/schemas/lots.ts';
import { useNow } from '../../../lib/use-now.ts';
import { fieldIdOf, isBlank, valueAt } from '../../../components/lot-form/field-ids.ts';

/** Speaks of what another field lacks: told at submission, not while typing. */
const ONLY_AT_SUBMISSION = new Set(['nothing-paid-for', 'result-missing', 'item-not-identified']);

type ServerProblem = LotProblem & { valueThen: string };

const printed = (draft: LotDraft, pointer: string) => JSON.stringify(valueAt(draft, pointer)) ?? '';

/**
 * What is wrong in the draft, by the same check as the server's. A field is called wrong once it has been left with
 * something in it; everything, missing fields included, once the lot was handed in. What only the server found stays
 * until that field is changed.
 */
export function useDraftProblems(draft: LotDraft) {
  const now = useNow(60_000);
  const checked = useDeferredValue(draft);
  const [touched, setTouched] = useState<ReadonlySet<string>>(new Set());
  const [found, setFound] = useState<ServerProblem[]>([]);
  const [attempt, setAttempt] = useState(0);
  const [told, setTold] = useState<LotProblem[]>([]);
  const own = useMemo(() => checkLotDraft(checked, new Date(now)).problems, [checked, now]);
  const standing = useMemo(
    () => [...own, ...found.filter((problem) => printed(checked, problem.pointer) === problem.valueThen)],
    [own, found, checked],
  );
  const errors = useMemo(() => {
    const byField = new Map<string, string>();
    for (const problem of standing) {
      const id = fieldIdOf(problem.pointer);
      const isShown = attempt > 0 || (isTouched(touched, id) && isTold(problem, checked));
      if (isShown && !byField.has(id)) byField.set(id, problem.message);
    }
    return byField;
  }, [standing, attempt, touched, checked]);
  const items = told
    .filter((problem) => !isOfDraft(problem) || standing.some((other) => isSame(problem, other)))
    .map(({ pointer, message }) => ({ fieldId: pointer === '' ? null : fieldIdOf(pointer), message }));
  const touch = useCallback((id: string) => {
    setTouched((before) => (before.has(id) ? before : new Set(before).add(id)));
  }, []);
  /** Tells all of it in the summary; a pointer of '' belongs to no field. */
  const refuse = (problems: LotProblem[], fromServer = false) => {
    if (fromServer)
      setFound(problems.map((problem) => ({ ...problem, valueThen: printed(draft, problem.pointer) })));
    setTold(inFormOrder(problems));
    setAttempt((count) => count + 1);
  };
  const clear = () => {
    setTold([]);
    setFound([]);
  };
  return {
    errorAt: (pointer: string) => errors.get(fieldIdOf(pointer)),
    items,
    attempt,
    touch,
    refuse,
    clear,
  };
}

export type DraftProblems = ReturnType<typeof useDraftProblems>;

const isSame = (left: LotProblem, right: LotProblem) =>
  left.pointer === right.pointer && left.message === right.message;

const LAST_PARTS = [
  'pricing',
  'price',
  'linkedPercent',
  'floorPercent',
  'shipping',
  'destinations',
  'closesOn',
  'confirmsCautions',
  'confirmsTitle',
];

/** The check names terms before the certificate; the form asks for them after it. */
function inFormOrder(problems: LotProblem[]): LotProblem[] {
  const rank = ({ pointer }: LotProblem) => LAST_PARTS.indexOf(pointer.split('/')[1] ?? '');
  return [...problems].sort((left, right) => rank(left) - rank(right));
}

/** What was refused for a reason outside the draft stays until the next try. */
const isOfDraft = ({ pointer }: LotProblem) => (pointer.split('/')[1] ?? '') in lotDraft.shape;

function isTouched(touched: ReadonlySet<string>, id: string): boolean {
  return touched.has(id) || [...touched].some((other) => other.startsWith(`${id}-`));
}

function isTold({ pointer, code }: LotProblem, draft: LotDraft): boolean {
  return !ONLY_AT_SUBMISSION.has(code) && !isBlank(valueAt(draft, pointer));
}

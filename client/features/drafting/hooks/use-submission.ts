import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { checkLotDraft, type LotProblem } from '#shared/lot-submission.ts';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { ApiProblem } from '../../../lib/api-client.ts';
import { myLotsQuery, ownLotQuery } from '../../../lib/lots.ts';
import { submitLot } from '../api/submit-lot.ts';
import type { DraftProblems } from './use-draft-problems.ts';
import type { DraftSaving } from './use-draft-saving.ts';

const NOT_SAVED: LotProblem = {
  pointer: '',
  code: 'not-saved',
  message: 'The draft could not be saved, so it was not handed in. What you typed stands here; try again.',
};
export const PAYOUTS_FIRST: LotProblem = {
  pointer: '/payouts',
  code: 'payout-onboarding-required',
  message: 'Selling opens after payout onboarding: finish it on the account page.',
};

function problemsOf(error: unknown): LotProblem[] {
  if (error instanceof ApiProblem) {
    if (error.code === PAYOUTS_FIRST.code) return [PAYOUTS_FIRST];
    if (error.errors.length > 0) return error.errors;
  }
  const message = error instanceof Error ? error.message : 'The lot could not be handed in.';
  return [{ pointer: '', code: 'refused', message }];
}

/**
 * Hands the draft in: the check runs here first and tells all that is missing; what passes is restated, saved, and checked
 * again by the server, whose refusals end at the same fields.
 */
export function useSubmission(
  code: string,
  saving: DraftSaving,
  problems: DraftProblems,
  { canSell, onDone }: { canSell: boolean; onDone: (lot: LotAnswer) => void },
) {
  const client = useQueryClient();
  const [isConfirming, setIsConfirming] = useState(false);
  const mutation = useMutation({
    mutationFn: async (): Promise<LotAnswer | null> => ((await saving.save()) ? submitLot(code) : null),
    onSuccess: async (lot) => {
      setIsConfirming(false);
      if (lot === null) return problems.refuse([NOT_SAVED]);
      client.setQueryData(ownLotQuery(code).queryKey, lot);
      onDone(lot);
      await client.invalidateQueries({ queryKey: myLotsQuery.queryKey });
    },
    onError: (error) => {
      setIsConfirming(false);
      problems.refuse(problemsOf(error), true);
    },
  });
  const ask = () => {
    const found = checkLotDraft(saving.draft, new Date()).problems;
    const all = canSell ? found : [PAYOUTS_FIRST, ...found];
    if (all.length > 0) return problems.refuse(all);
    problems.clear();
    setIsConfirming(true);
  };
  return {
    ask,
    isConfirming,
    isBusy: mutation.isPending,
    confirm: () => mutation.mutate(),
    cancel: () => setIsConfirming(false),
  };
}

import { useQueryClient } from '@tanstack/react-query';
import { useCallback, useEffect, useRef, useState } from 'react';
import type { LotAnswer, LotDraft } from '#shared/schemas/lots.ts';
import { ApiProblem, apiGet } from '../../../lib/api-client.ts';
import { lotUrl, myLotsQuery, ownLotQuery } from '../../../lib/lots.ts';
import { saveDraft } from '../api/save-draft.ts';

export type SaveState =
  /** `at` is null while nothing was saved from this window yet. */
  | { kind: 'saved'; at: string | null }
  | { kind: 'changed' }
  | { kind: 'saving' }
  | { kind: 'failed'; message: string }
  /** Saved elsewhere since it was read: nothing is sent until the member has chosen. */
  | { kind: 'conflict'; theirs: LotAnswer };

const QUIET_MS = 3_000;

type Kept = { draft: LotDraft; saved: LotDraft; version: number };

/**
 * Holds the draft as typed and keeps it on the server: by `save`, and by itself once typing has stopped. One save at a
 * time, each naming the version it was made on, so that a second window is noticed and never overwritten unseen.
 */
export function useDraftSaving(code: string, first: { draft: LotDraft; version: number }) {
  const client = useQueryClient();
  const [draft, setDraft] = useState(first.draft);
  const [state, setState] = useState<SaveState>({ kind: 'saved', at: null });
  const kept = useRef<Kept>({ draft: first.draft, saved: first.draft, version: first.version });
  const flight = useRef<Promise<boolean> | null>(null);

  const change = useCallback((step: (before: LotDraft) => LotDraft) => {
    kept.current.draft = step(kept.current.draft);
    setDraft(kept.current.draft);
    setState((before) => (before.kind === 'conflict' ? before : { kind: 'changed' }));
  }, []);

  const send = useCallback(async (): Promise<boolean> => {
    const sent = kept.current.draft;
    setState({ kind: 'saving' });
    try {
      const answer = await saveDraft(code, { draft: sent, version: kept.current.version });
      kept.current.version = answer.version;
      kept.current.saved = sent;
      // Photos travel by requests of their own, which may have ended later than this one.
      client.setQueryData(ownLotQuery(code).queryKey, (before) => ({
        ...answer,
        photos: before?.photos ?? answer.photos,
      }));
      void client.invalidateQueries({ queryKey: myLotsQuery.queryKey });
      const isAllSaved = kept.current.draft === sent;
      setState(isAllSaved ? { kind: 'saved', at: new Date().toISOString() } : { kind: 'changed' });
      return true;
    } catch (error) {
      setState(await stateAfter(error, code));
      return false;
    }
  }, [client, code]);

  /** True when everything typed is on the server. */
  const save = useCallback(async (): Promise<boolean> => {
    while (flight.current) await flight.current;
    while (kept.current.draft !== kept.current.saved) {
      flight.current = send().finally(() => {
        flight.current = null;
      });
      if (!(await flight.current)) return false;
    }
    return true;
  }, [send]);

  useAutosave(draft, state, save);
  const isDirty = useCallback(() => kept.current.draft !== kept.current.saved, []);

  const keepMine = (theirs: LotAnswer) => {
    kept.current.version = theirs.version;
    // What stands on the server is no longer what was read, so that this draft is sent even if it is as it was.
    kept.current.draft = { ...kept.current.draft };
    return save();
  };
  const takeTheirs = (theirs: LotDraft, version: number) => {
    kept.current = { draft: theirs, saved: theirs, version };
    setDraft(theirs);
    setState({ kind: 'saved', at: null });
  };
  return { draft, change, save, state, isDirty, keepMine, takeTheirs };
}

export type DraftSaving = ReturnType<typeof useDraftSaving>;

async function stateAfter(error: unknown, code: string): Promise<SaveState> {
  const message = error instanceof Error ? error.message : 'The draft could not be saved.';
  if (!(error instanceof ApiProblem) || error.code !== 'version-conflict') return { kind: 'failed', message };
  try {
    return { kind: 'conflict', theirs: await apiGet<LotAnswer>(lotUrl(code)) };
  } catch (unread) {
    return { kind: 'failed', message: unread instanceof Error ? unread.message : message };
  }
}

function useAutosave(draft: LotDraft, state: SaveState, save: () => Promise<boolean>) {
  const isWaiting = state.kind === 'changed';
  useEffect(() => {
    if (!isWaiting) return;
    const timer = setTimeout(() => void save(), QUIET_MS);
    return () => clearTimeout(timer);
  }, [draft, isWaiting, save]);
  const hasFailed = state.kind === 'failed';
  useEffect(() => {
    if (!hasFailed) return;
    const retry = () => void save();
    window.addEventListener('online', retry);
    return () => window.removeEventListener('online', retry);
  }, [hasFailed, save]);
}

import { useQueryClient } from '@tanstack/react-query';
import type { CaseAnswer } from '#shared/schemas/desk.ts';
import { confirmDone } from '../../../components/ui/toast-store.ts';
import { caseQuery, queueQuery } from '../api/certificates.ts';

/** Takes over the case that an act answered, and asks for the queue again. */
export function useCaseRefresh(): (view: CaseAnswer, said: string) => Promise<unknown> {
  const client = useQueryClient();
  return (view, said) => {
    client.setQueryData(caseQuery(view.id).queryKey, view);
    confirmDone(said);
    return client.invalidateQueries({ queryKey: queueQuery.queryKey });
  };
}

/** Asks for a case again after a refusal: a colleague may have acted on it. */
export function useCaseReload(id: string): () => Promise<unknown> {
  const client = useQueryClient();
  return () => client.invalidateQueries({ queryKey: caseQuery(id).queryKey });
}

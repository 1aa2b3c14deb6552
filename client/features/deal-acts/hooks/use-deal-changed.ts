import { useQueryClient } from '@tanstack/react-query';
import { useCallback } from 'react';
import type { DealAnswer } from '#shared/schemas/deals.ts';
import { confirmDone } from '../../../components/ui/toast-store.ts';
import { dealQuery, dealsQuery } from '../../../lib/deals.ts';

/** The place on the page that takes the focus when a panel has done its work and is gone. */
export const REGISTER_ID = 'deal-register';

/** Takes over the deal that an act answered, and lets go of every list that tells of it. */
export function useDealChanged(code: string) {
  const client = useQueryClient();
  return useCallback(
    (deal: DealAnswer, said: string) => {
      client.setQueryData(dealQuery(code).queryKey, deal);
      confirmDone(said);
      document.getElementById(REGISTER_ID)?.focus();
      return Promise.all([
        client.invalidateQueries({ queryKey: dealsQuery.queryKey }),
        client.invalidateQueries({ queryKey: ['desk'] }),
        client.invalidateQueries({ queryKey: ['lot', deal.lot.code] }),
      ]);
    },
    [client, code],
  );
}

/** Reads the deal again after a refusal: the other side, the desk or a clock may have acted. */
export function useDealReload(code: string) {
  const client = useQueryClient();
  return useCallback(() => client.invalidateQueries({ queryKey: dealQuery(code).queryKey }), [client, code]);
}

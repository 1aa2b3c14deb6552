import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { LotAnswer, PriceFixAnswer } from '#shared/schemas/lots.ts';
import { apiSend } from './api-client.ts';
import { lotQuery } from './lot-query.ts';
import { lotUrl } from './lots.ts';
import { useAttemptKey } from './use-attempt-key.ts';

/** Fixing a linked price holds the lot; giving the fix up offers it again. Either way the lot is read anew. */
export function usePriceFix(code: string) {
  const client = useQueryClient();
  const attempt = useAttemptKey();
  const afterwards = () =>
    Promise.all([
      client.invalidateQueries({ queryKey: lotQuery(code).queryKey }),
      client.invalidateQueries({ queryKey: ['register'], refetchType: 'none' }),
    ]);
  const fix = useMutation({
    mutationFn: () =>
      apiSend<PriceFixAnswer>(`${lotUrl(code)}/price-fix`, { idempotencyKey: attempt.keyFor({ code }) }),
    onError: (error) => attempt.settle(error),
    onSettled: afterwards,
  });
  const giveUp = useMutation({
    mutationFn: () => apiSend<LotAnswer>(`${lotUrl(code)}/price-fix/give-up`, {}),
    onSettled: afterwards,
  });
  return { fix, giveUp };
}

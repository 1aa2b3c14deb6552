import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { PurchaseRequest } from '#shared/schemas/deals.ts';
import { leaveTo } from '../../../lib/leave-to.ts';
import { useAttemptKey } from '../../../lib/use-attempt-key.ts';
import { lotQuery } from '../../../lib/lot-query.ts';
import { purchaseLot } from '../api/purchase-lot.ts';
import { startPayment } from '../api/start-payment.ts';

/**
 * Agreeing and paying are two acts with a key each. Once the deal is made it stays made: a payment page that did not
 * open is asked for again without a second purchase.
 */
export function usePurchase(code: string) {
  const client = useQueryClient();
  const purchaseKey = useAttemptKey();
  const paymentKey = useAttemptKey();
  const afterwards = () =>
    Promise.all([
      client.invalidateQueries({ queryKey: lotQuery(code).queryKey }),
      client.invalidateQueries({ queryKey: ['register'], refetchType: 'none' }),
      client.invalidateQueries({ queryKey: ['deals'] }),
    ]);

  const payment = useMutation({
    mutationFn: (dealCode: string) =>
      startPayment({ dealCode, idempotencyKey: paymentKey.keyFor({ dealCode }) }),
    onSuccess: ({ url }) => leaveTo(url),
    onError: (error) => paymentKey.settle(error),
  });
  const purchase = useMutation({
    mutationFn: (body: PurchaseRequest) =>
      purchaseLot({ code, body, idempotencyKey: purchaseKey.keyFor(body) }),
    onSuccess: (deal) => payment.mutate(deal.code),
    onError: (error) => purchaseKey.settle(error),
    onSettled: afterwards,
  });
  return { purchase, payment };
}

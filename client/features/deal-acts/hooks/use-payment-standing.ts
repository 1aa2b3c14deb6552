import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { dealQuery, dealsQuery } from '../../../lib/deals.ts';
import { refreshPayment, type PaymentStanding } from '../api/refresh-payment.ts';

const ASK_EVERY_MS = 3_000;
const ASK_AT_MOST = 20;

/** Whether the provider's answer may still change by itself. */
function isOpen(standing: PaymentStanding): boolean {
  return standing.state === 'agreed' && (standing.payment === 'open' || standing.payment === 'starting');
}

/**
 * Asks the provider how the payment stands, again and again for a minute while it is still open and the buyer says that
 * he has paid; then the asking is left to him.
 */
export function usePaymentStanding(code: string, saysPaid: boolean) {
  const client = useQueryClient();
  const [asksLeft, setAsksLeft] = useState(ASK_AT_MOST);
  const query = useQuery({
    queryKey: ['payment', code],
    queryFn: () => refreshPayment(code),
    gcTime: 0,
    staleTime: Infinity,
    retry: false,
    refetchOnWindowFocus: false,
  });
  const { data, refetch, dataUpdatedAt } = query;
  const isWaiting = saysPaid && data !== undefined && isOpen(data) && asksLeft > 0 && !query.isError;
  useEffect(() => {
    if (!isWaiting) return;
    const timer = setTimeout(() => {
      setAsksLeft((left) => left - 1);
      void refetch();
    }, ASK_EVERY_MS);
    return () => clearTimeout(timer);
  }, [isWaiting, refetch, dataUpdatedAt]);
  useEffect(() => {
    if (data === undefined) return;
    void client.invalidateQueries({ queryKey: dealQuery(code).queryKey });
    void client.invalidateQueries({ queryKey: dealsQuery.queryKey });
  }, [client, code, data]);
  const askAgain = () => {
    setAsksLeft(ASK_AT_MOST);
    void refetch();
  };
  return { ...query, isWaiting, askAgain };
}

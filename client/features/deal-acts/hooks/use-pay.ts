import { useMutation } from '@tanstack/react-query';
import { leaveTo } from '../../../lib/leave-to.ts';
import { useAttemptKey } from '../../../lib/use-attempt-key.ts';
import { startPayment } from '../api/start-payment.ts';
import { useDealReload } from './use-deal-changed.ts';

/** Goes on to the provider's page; asked again after a lost connection it opens the same page. */
export function usePay(code: string) {
  const attempt = useAttemptKey();
  const reload = useDealReload(code);
  return useMutation({
    mutationFn: () => startPayment(code, attempt.keyFor({ pay: code })),
    onSuccess: ({ url }) => leaveTo(url),
    onError: (error) => {
      attempt.settle(error);
      return reload();
    },
  });
}

import { useEffect, useRef } from 'react';
import { Button, LinkButton } from '../../../components/ui/button.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { ApiProblem } from '../../../lib/api-client.ts';
import { formatMoney } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';

type PurchaseMadeProps = {
  dealCode: string;
  total: string;
  error: unknown;
  isPending: boolean;
  onPay: () => void;
};

/** The deal stands; only its payment page is missing. */
export function PurchaseMade({ dealCode, total, error, isPending, onPay }: PurchaseMadeProps) {
  const box = useRef<HTMLDivElement>(null);
  useEffect(() => box.current?.focus(), [error]);
  return (
    <div ref={box} tabIndex={-1}>
      <Notice
        tone={error ? 'attention' : 'good'}
        role={error ? 'alert' : 'status'}
        title={error ? 'The payment page did not open' : 'The lot is reserved for you'}
      >
        <p>
          {error instanceof ApiProblem && `${error.detail} `}
          Deal <span className="fig">{dealCode}</span> is agreed
          {error
            ? ' and the lot stays reserved for you for a short time. Nothing has been paid yet.'
            : '. The payment page is opening.'}
        </p>
        <div className="mt-3 flex flex-wrap gap-3">
          <Button busy={isPending} busyText="Opening the payment page" onClick={onPay}>
            Pay {formatMoney(total)} into escrow
          </Button>
          <LinkButton look="quiet" to={paths.deal(dealCode)}>
            Open the deal
          </LinkButton>
        </div>
      </Notice>
    </div>
  );
}

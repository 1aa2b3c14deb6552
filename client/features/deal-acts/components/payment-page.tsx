import { useSuspenseQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import type { DealAnswer } from '#shared/schemas/deals.ts';
import { Button, LinkButton } from '../../../components/ui/button.tsx';
import { Notice, type NoticeTone } from '../../../components/ui/notice.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { Deadline } from '../../../components/ui/time.tsx';
import { formatMoney } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import { dealQuery } from '../../../lib/deals.ts';
import { actText } from '../deal-acts.ts';
import { stateWord } from '../../../components/figures/deal-words.ts';
import { usePay } from '../hooks/use-pay.ts';
import { usePaymentStanding } from '../hooks/use-payment-standing.ts';

/** Why the buyer is here: he says he has paid, or he turned back. */
export type PaymentArrival = 'returned' | 'stopped';
type Standing = ReturnType<typeof usePaymentStanding>;
type Said = { title: string; text: ReactNode; tone: NoticeTone; isSettled?: boolean };

function whatIsTrue(standing: Standing, deal: DealAnswer, arrival: PaymentArrival): Said {
  const { data, isError, error, isPending, isWaiting } = standing;
  const sum = formatMoney(deal.total.amount);
  if (isError)
    return {
      tone: 'attention',
      title: 'The payment provider could not be asked',
      text: `${error.message} If you have paid, the payment is not lost: the provider also tells us by itself.`,
    };
  if (isPending)
    return { tone: 'plain', title: 'Asking the provider', text: 'This takes a moment; stay on this page.' };
  if (data.state === 'lapsed')
    return {
      tone: 'attention',
      title: 'The purchase has lapsed',
      text: 'It was not paid in time, and the lot is open again. A payment that comes after all is sent back in full.',
      isSettled: true,
    };
  if (data.state !== 'agreed')
    return {
      tone: data.state === 'cancelled' ? 'attention' : 'good',
      title: data.state === 'funded' ? `${sum} is held in escrow` : stateWord(data.state),
      text:
        data.state === 'funded'
          ? 'The provider confirms the payment. The seller has been told to ship.'
          : 'The deal has gone on; its register tells how.',
      isSettled: true,
    };
  if (isWaiting)
    return {
      tone: 'plain',
      title: 'The provider has not confirmed yet',
      text: 'We go on asking for a minute. Nothing is held so far.',
    };
  if (data.payment === 'expired')
    return {
      tone: 'attention',
      title: 'The payment page has run out',
      text: 'Nothing was taken and nothing is held.',
    };
  return {
    tone: 'attention',
    title: 'Not paid yet',
    text:
      arrival === 'stopped'
        ? 'You turned back before paying. Nothing was taken and nothing is held; the lot stays reserved for you until the deadline.'
        : 'The provider says that this payment is not complete. Nothing is held. If your bank shows otherwise, ask again in a while.',
  };
}

type PaymentPageProps = { code: string; arrival: PaymentArrival };

/** Where the provider sends the buyer back to. */
export function PaymentPage({ code, arrival }: PaymentPageProps) {
  const { data: deal } = useSuspenseQuery(dealQuery(code));
  const standing = usePaymentStanding(code, arrival === 'returned');
  const pay = usePay(code);
  const said = whatIsTrue(standing, deal, arrival);
  const mayPay = deal.can.pay && !standing.isPending && !standing.isWaiting && !said.isSettled;
  return (
    <Page title={`Payment of deal ${deal.code}`} sub={deal.lot.title}>
      <OfflineNotice />
      <p className="mb-5 max-w-prose text-ink-2">
        The page you come from proves nothing: we ask the provider.
      </p>
      <Notice tone={said.tone} title={said.title} role={standing.isError ? 'alert' : 'status'}>
        {said.text}
      </Notice>
      {!said.isSettled && deal.state === 'agreed' && deal.due?.at && (
        <p className="mt-4">
          Pay by <Deadline at={deal.due.at} />
        </p>
      )}
      {pay.isError && (
        <Notice tone="attention" role="alert" title="The payment page did not open" className="mt-4">
          {pay.error.message}
        </Notice>
      )}
      <div className="mt-6 flex flex-wrap gap-3">
        {said.isSettled && <LinkButton to={paths.deal(code)}>Open the deal</LinkButton>}
        {mayPay && (
          <Button
            busy={pay.isPending || pay.isSuccess}
            busyText="Opening the payment page"
            onClick={() => pay.mutate()}
          >
            {actText('pay', deal)}
          </Button>
        )}
        {!said.isSettled && !standing.isPending && !standing.isWaiting && (
          <Button
            look="second"
            busy={standing.isFetching}
            busyText="Asking the provider"
            onClick={standing.askAgain}
          >
            Ask the provider again
          </Button>
        )}
        {!said.isSettled && (
          <LinkButton look="quiet" to={paths.deal(code)}>
            Open the deal
          </LinkButton>
        )}
      </div>
    </Page>
  );
}

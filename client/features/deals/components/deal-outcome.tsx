import type { DealAnswer } from '#shared/schemas/deals.ts';
import { Money } from '../../../components/figures/money.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { contestWord, payoutWord, refundWord } from '../../../components/figures/deal-words.ts';

/** What became of the money, and what stands against the deal, in words. */
export function DealOutcome({ deal }: { deal: DealAnswer }) {
  const { payout, refund, contest, endReason, isFrozen } = deal;
  return (
    <>
      {isFrozen && (
        <Notice tone="attention" title="The desk has frozen this deal">
          Its clocks stand still and nothing moves until the freeze is lifted. The reason stands in the
          register.
        </Notice>
      )}
      {contest && (
        <Notice tone="attention" title={contestWord(contest.reason)}>
          <p className="whitespace-pre-line">{contest.note}</p>
          <p className="mt-1 text-note text-ink-2">
            <Time at={contest.at} />
          </p>
        </Notice>
      )}
      {endReason && <Notice title="How it ended">{endReason}</Notice>}
      {payout && (
        <Notice
          tone={payout.state === 'paid' ? 'good' : payout.state === 'failed' ? 'attention' : 'plain'}
          title={deal.side === 'buyer' ? 'Payout to the seller' : 'Payout'}
        >
          {payoutWord(payout.state)}
          {deal.side !== 'buyer' && (
            <>
              : <Money value={payout.amount.amount} />
            </>
          )}
          {payout.paidAt && (
            <>
              , <Time at={payout.paidAt} />
            </>
          )}
          {payout.failureCode && deal.side !== 'buyer' && <> ({payout.failureCode.replaceAll('_', ' ')})</>}.
        </Notice>
      )}
      {refund && (
        <Notice
          tone={refund.state === 'succeeded' ? 'good' : refund.state === 'failed' ? 'attention' : 'plain'}
          title="Refund"
        >
          {refundWord(refund.state)}: <Money value={refund.amount.amount} />.
        </Notice>
      )}
    </>
  );
}

import type { DealAnswer } from '#shared/schemas/deals.ts';
import { Money } from '../../../components/figures/money.tsx';
import { formatPercent } from '../../../lib/format.ts';
import { isNothing } from '../../../components/figures/deal-words.ts';

type Line = { term: string; amount: string; isTotal?: boolean };

/** In these nothing goes to the seller, whatever the provisional sheet says. */
const endsUnpaid: readonly DealAnswer['state'][] = ['lapsed', 'cancelled', 'returned', 'reversed'];

function totalTerm({ state, side }: DealAnswer): string {
  if (state === 'lapsed') return 'Sum, never paid';
  if (state !== 'agreed') return 'Paid into escrow';
  return side === 'buyer' ? 'You pay into escrow' : 'The buyer pays into escrow';
}

function linesOf(deal: DealAnswer): Line[] {
  const lines: Line[] = [
    { term: 'Price of the metal', amount: deal.price.amount },
    { term: 'Insured parcel', amount: deal.shipping.amount },
    { term: totalTerm(deal), amount: deal.total.amount, isTotal: true },
  ];
  if (deal.commission === null || endsUnpaid.includes(deal.state)) return lines;
  const { percent, amount, net } = deal.commission;
  return [
    ...lines,
    { term: `Commission, ${formatPercent(percent)} of the price`, amount: amount.amount },
    {
      term: deal.side === 'seller' ? 'Goes to you' : 'Goes to the seller',
      amount: net.amount,
      isTotal: true,
    },
  ];
}

/** The sums of the deal, for the eyes of its reader, and what is held of them now. */
export function DealSums({ deal }: { deal: DealAnswer }) {
  return (
    <section aria-labelledby="deal-sums" className="sheet keep-together">
      <h2 id="deal-sums" className="px-4 pb-2 pt-4 text-lead">
        The sums, US$
      </h2>
      <dl>
        {linesOf(deal).map(({ term, amount, isTotal }) => (
          <div
            key={term}
            className={`flex items-baseline justify-between gap-4 border-t px-4 py-2 ${isTotal ? 'border-ink font-semibold' : 'border-rule'}`}
          >
            <dt>{term}</dt>
            <dd>
              <Money bare value={amount} />
            </dd>
          </div>
        ))}
        <div className="flex items-baseline justify-between gap-4 border-b-4 border-t border-double border-b-ink border-t-ink px-4 py-2.5 text-lead font-semibold [border-top-style:solid]">
          <dt>Held in escrow now</dt>
          <dd>
            <Money bare value={deal.held.amount} />
          </dd>
        </div>
      </dl>
      {isNothing(deal.held.amount) && deal.state === 'agreed' && (
        <p className="px-4 py-3 text-note text-ink-2">
          Nothing is held until the payment provider confirms the payment.
        </p>
      )}
    </section>
  );
}

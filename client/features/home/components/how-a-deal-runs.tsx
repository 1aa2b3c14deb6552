import { ARRIVE_DAYS, FUND_MINUTES, INSPECT_DAYS, SHIP_BUSINESS_DAYS } from '#shared/limits.ts';

/** Told as the book of a deal tells it: what is done, what is held meanwhile, and what silence means. */
const lines = [
  {
    act: 'The buyer agrees to the sheet and pays.',
    held: 'the whole sum, once the payment provider confirms it',
    silence: `Not paid within ${FUND_MINUTES} minutes: the purchase lapses and the lot is open again.`,
  },
  {
    act: 'The seller ships, insured for the price and against signature.',
    held: 'the whole sum',
    silence: `Not shipped within ${SHIP_BUSINESS_DAYS} business days: cancelled, and everything goes back to the buyer.`,
  },
  {
    act: 'The carrier delivers. Until then the risk is the seller’s.',
    held: 'the whole sum',
    silence: `Not there after ${ARRIVE_DAYS} days: the buyer can contest, and the desk rules.`,
  },
  {
    act: 'The buyer weighs what came, and accepts or contests.',
    held: 'the whole sum',
    silence: `${INSPECT_DAYS} days to look. The money stays held until somebody has decided.`,
  },
  {
    act: 'The final sheet is made; the seller is paid out, and both get the sheet.',
    held: 'nothing',
    silence: 'A payout that fails is tried again until it arrives.',
  },
];

export function HowADealRuns() {
  return (
    <table className="w-full border-collapse">
      <thead>
        <tr className="border-b border-ink text-left text-note text-ink-2">
          <th scope="col" className="py-2 pr-6 font-normal">
            act
          </th>
          <th scope="col" className="hidden py-2 pr-6 font-normal md:table-cell">
            what silence means
          </th>
          <th scope="col" className="w-2/6 py-2 text-right font-normal sm:w-1/4">
            held in escrow
          </th>
        </tr>
      </thead>
      <tbody>
        {lines.map(({ act, held, silence }) => (
          <tr key={act} className="border-b border-rule align-baseline">
            <td className="py-3 pr-6">
              {act}
              <span className="mt-0.5 block text-note text-ink-2 md:hidden">{silence}</span>
            </td>
            <td className="hidden py-3 pr-6 text-ink-2 md:table-cell">{silence}</td>
            <td className="py-3 text-right text-ink-2">{held}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

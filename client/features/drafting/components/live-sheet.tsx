import type { QuotesAnswer } from '#shared/schemas/quotes.ts';
import type { SettlementSheet } from '#shared/settlement/sheet-types.ts';
import { MeltRule } from '../../../components/figures/melt-rule.tsx';
import { Money } from '../../../components/figures/money.tsx';
import { SettlementSheetView } from '../../../components/figures/settlement-sheet-view.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { formatMoney, formatPercent } from '../../../lib/format.ts';
import { bandOf } from '../../../lib/shown-figures.ts';
import type { LiveSheetFigures, NetLine } from '../hooks/use-live-sheet.ts';
import { LIVE_SHEET_ID } from './sheet-line.tsx';

const methodNames: Record<NetLine['method'], string> = { card: 'card', bank_debit: 'bank debit' };

/** What the lot is worth and what it would pay out, from what is typed and the newest quotes. */
export function LiveSheet({
  live: { sheet, nets, quotes },
  isLinked,
}: {
  live: LiveSheetFigures;
  isLinked: boolean;
}) {
  return (
    <section aria-labelledby={LIVE_SHEET_ID} className="flex flex-col gap-5">
      <h2 id={LIVE_SHEET_ID} tabIndex={-1} className="scroll-mt-4">
        What it comes to
      </h2>
      {quotes && <QuoteRemark quotes={quotes} sheet={sheet} />}
      {sheet ? <Rule sheet={sheet} isLinked={isLinked} /> : <Waiting quotes={quotes} />}
      {nets.length > 0 && <Nets nets={nets} />}
      {sheet && <SettlementSheetView sheet={sheet} title="Your sheet" />}
    </section>
  );
}

function QuoteRemark({ quotes, sheet }: { quotes: QuotesAnswer; sheet: SettlementSheet | null }) {
  if (quotes.state === 'closed')
    return (
      <Notice role="status" title="The market is closed">
        Figures rest on its last quotes.
      </Notice>
    );
  const used = sheet?.quotes.map((quote) => quote.metal) ?? quotes.quotes.map((quote) => quote.metal);
  const old = quotes.quotes.filter((quote) => used.includes(quote.metal) && !quote.isFresh);
  const oldest = old.map((quote) => quote.at).sort()[0];
  if (quotes.quotes.length > 0 && oldest === undefined) return null;
  return (
    <Notice tone="attention" role="status" title="There is no fresh quote">
      {oldest ? (
        <>
          Figures rest on the last accepted quote, of <Time at={oldest} />, and may have moved since.
        </>
      ) : (
        'What the metal is worth now is not known. The draft is kept all the same.'
      )}
    </Notice>
  );
}

function Waiting({ quotes }: { quotes: QuotesAnswer | undefined }) {
  const at = quotes?.quotes.map((quote) => quote.at).sort()[0];
  return (
    <div className="sheet p-4 text-ink-2">
      {at !== undefined && <MeltRule band={null} marks={[]} quote={{ at }} />}
      <p className="mt-2">
        {quotes && quotes.quotes.length === 0
          ? 'As soon as there is a quote, the sheet stands here.'
          : 'Enter the gross mass, a metal that is paid for and its fineness: the sheet then stands here and follows what you type.'}
      </p>
    </div>
  );
}

function Rule({ sheet, isLinked }: { sheet: SettlementSheet; isLinked: boolean }) {
  const at = sheet.quotes.map((quote) => quote.at).sort()[0] ?? null;
  return (
    <div className="sheet p-4">
      <MeltRule
        band={bandOf(sheet.melt)}
        marks={
          sheet.percentOfMelt ? [{ kind: isLinked ? 'linked' : 'price', percent: sheet.percentOfMelt }] : []
        }
        quote={{ at }}
      />
    </div>
  );
}

function Nets({ nets }: { nets: NetLine[] }) {
  return (
    <div className="sheet p-4">
      <table className="w-full text-[0.875rem]">
        <caption className="pb-2 text-left text-lead font-semibold">To you, by how the buyer pays</caption>
        <thead>
          <tr className="text-note text-ink-2">
            <th scope="col" className="py-1 text-left font-normal">
              paid by
            </th>
            <th scope="col" className="py-1 text-right font-normal">
              commission, US$
            </th>
            <th scope="col" className="py-1 text-right font-normal">
              to you, US$
            </th>
          </tr>
        </thead>
        <tbody>
          {nets.map((line) => (
            <tr key={line.method} className="border-t border-rule align-baseline">
              <th scope="row" className="py-2 text-left font-normal">
                {methodNames[line.method]}
                <span className="block text-note text-ink-2">
                  {formatPercent(line.percent)}, at least {formatMoney(line.minimum)}
                </span>
              </th>
              <td className="py-2 text-right">
                <Money bare value={line.commission} />
              </td>
              <td className="py-2 text-right font-semibold">
                <Money bare value={line.net} />
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="mt-2 text-note text-ink-2">
        Price and insured parcel less commission. The commission is on the price alone.
      </p>
    </div>
  );
}

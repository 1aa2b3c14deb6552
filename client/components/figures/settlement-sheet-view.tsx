import { useState } from 'react';
import type { QuoteRef, SettlementSheet, SheetMoment } from '#shared/settlement/sheet-types.ts';
import { METAL_NAMES } from '#shared/metals.ts';
import { shortQuoteNumber } from '#shared/quote-number.ts';
import { formatMoment, formatPercent, THIN } from '../../lib/format.ts';
import { useReader } from '../../lib/reader-context.ts';
import { Button } from '../ui/button.tsx';
import { Stamp } from '../ui/stamp.tsx';
import { Money, MoneyRange } from './money.tsx';
import { SettlementSheetLine } from './settlement-sheet-line.tsx';

type SettlementSheetViewProps = { sheet: SettlementSheet; title?: string };

const moments: Record<SheetMoment, string> = {
  estimated: 'what would be paid now',
  provisional: 'what was agreed; settles as the deal goes on',
  final: 'settled',
};

/** The statement of how a price follows from mass, assay and quote; every line opens to its working. */
export function SettlementSheetView({ sheet, title = 'Settlement sheet' }: SettlementSheetViewProps) {
  const [allOpen, setAllOpen] = useState(false);
  return (
    <section aria-label={title} className="sheet @container [--pad:1rem] sm:[--pad:1.125rem]">
      <div className="flex flex-wrap items-center justify-between gap-x-4 gap-y-1 px-(--pad) pb-2 pt-4">
        <h2 className="text-lead">
          {title}{' '}
          <span title={moments[sheet.moment]} className="ml-1 align-[1px]">
            <Stamp tone={sheet.moment === 'final' ? 'good' : 'plain'}>{sheet.moment}</Stamp>
          </span>
        </h2>
        <Button
          look="quiet"
          aria-pressed={allOpen}
          onClick={() => setAllOpen(!allOpen)}
          className="no-print -ml-2 min-h-8 text-note"
        >
          {allOpen ? 'Close every working' : 'Open every working'}
        </Button>
      </div>
      <table className="w-full border-collapse text-[0.875rem]">
        <thead>
          <tr className="text-note text-ink-2">
            <th scope="col" className="px-(--pad) py-1.5 text-left font-normal">
              line
            </th>
            <th scope="col" className="hidden py-1.5 pr-4 text-right font-normal @md:table-cell">
              quantity
            </th>
            <th scope="col" className="hidden py-1.5 pr-4 text-right font-normal @md:table-cell">
              rate
            </th>
            <th scope="col" className="py-1.5 pr-(--pad) text-right font-normal">
              US$
            </th>
          </tr>
        </thead>
        <tbody>
          {sheet.lines.map((line) => (
            <SettlementSheetLine
              key={line.key}
              line={line}
              isOpen={allOpen}
              remark={line.kind === 'sum' ? <Spread percent={sheet.melt.expandedPercent} /> : null}
            />
          ))}
        </tbody>
      </table>
      <SheetNotes sheet={sheet} isOpen={allOpen} />
    </section>
  );
}

function Spread({ percent }: { percent: string }) {
  return (
    <span className="fig text-note text-ink-2">
      ±{THIN}
      {formatPercent(percent)}
    </span>
  );
}

function SheetNotes({ sheet, isOpen }: { sheet: SettlementSheet; isOpen: boolean }) {
  return (
    <div className="flex flex-col gap-1.5 px-(--pad) py-3 text-note text-ink-2">
      <p>
        Melt value: 95 % range <MoneyRange low={sheet.melt.low} high={sheet.melt.high} />
        {sheet.percentOfMelt && (
          <>
            {' '}
            · price at <span className="fig">{formatPercent(sheet.percentOfMelt)}</span> of melt
          </>
        )}
      </p>
      {sheet.quotes.map((quote) => (
        <QuoteLine key={quote.metal} quote={quote} isOpen={isOpen} />
      ))}
      {sheet.assumed.length > 0 && (
        <div>
          <p>
            {sheet.assumed.some(isQuoteNote) ? 'Assumed, or to be known:' : 'Not given, therefore assumed:'}
          </p>
          <ul className="list-disc pl-5">
            {sheet.assumed.map((item) => (
              <li key={item.field}>
                {assumedName(item.field)} {item.value}. {item.reason}
              </li>
            ))}
          </ul>
        </div>
      )}
    </div>
  );
}

function isQuoteNote({ field }: { field: string }): boolean {
  return field.startsWith('/quotes/');
}

function assumedName(field: string): string {
  if (field.startsWith('/quotes/')) return 'Quote:';
  return field.endsWith('/readability') ? 'Readability of the balance:' : 'Expanded uncertainty:';
}

/** The whole number of a quote is shown with the working; else its end tells it apart. */
function QuoteLine({ quote, isOpen }: { quote: QuoteRef; isOpen: boolean }) {
  const { timeZone } = useReader();
  return (
    <p>
      {METAL_NAMES[quote.metal]} at <Money value={quote.usdPerTroyOunce} /> per oz t fine
      {quote.at ? `, quote of ${formatMoment(quote.at, timeZone)}` : ''}, {quote.source}
      {quote.id && (
        <>
          {', no. '}
          <span title={quote.id} className="fig [overflow-wrap:anywhere]">
            {isOpen ? quote.id : shortQuoteNumber(quote.id)}
          </span>
        </>
      )}
    </p>
  );
}

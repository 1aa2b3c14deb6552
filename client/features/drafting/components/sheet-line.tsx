import type { MouseEvent } from 'react';
import type { SettlementSheet } from '#shared/settlement/sheet-types.ts';
import { Money } from '../../../components/figures/money.tsx';
import { formatMoney, formatPercent } from '../../../lib/format.ts';
import { usePaced } from '../../../lib/use-paced.ts';

export const LIVE_SHEET_ID = 'live-sheet';
const ANNOUNCE_AFTER_MS = 3_000;

function wordsOf({ total, percentOfMelt, melt }: SettlementSheet): string {
  if (total === null || percentOfMelt === null) return `Estimate: melt value ${formatMoney(melt.value)}`;
  return `Estimate: ${formatMoney(total)} to you · ${formatPercent(percentOfMelt)} of melt`;
}

function Words({ sheet: { total, percentOfMelt, melt } }: { sheet: SettlementSheet }) {
  if (total === null || percentOfMelt === null) {
    return (
      <>
        Estimate: melt value <Money value={melt.value} />
      </>
    );
  }
  return (
    <>
      Estimate: <Money value={total} /> to you · <span className="fig">{formatPercent(percentOfMelt)}</span>{' '}
      of melt
    </>
  );
}

function goToSheet(event: MouseEvent) {
  const heading = document.getElementById(LIVE_SHEET_ID);
  if (!heading) return;
  event.preventDefault();
  heading.scrollIntoView({ block: 'start' });
  heading.focus({ preventScroll: true });
}

/** Where the sheet stands far below the fields: its result in a line, which leads to it. */
export function SheetLine({ sheet }: { sheet: SettlementSheet | null }) {
  const words = sheet && wordsOf(sheet);
  const announced = usePaced(words, ANNOUNCE_AFTER_MS);
  return (
    <div className="text-note lg:hidden">
      {sheet && (
        <a href={`#${LIVE_SHEET_ID}`} onClick={goToSheet} className="link mb-1 inline-block py-0.5">
          <Words sheet={sheet} />
        </a>
      )}
      <span aria-live="polite" className="sr-only">
        {announced}
      </span>
    </div>
  );
}

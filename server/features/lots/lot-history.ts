import type { LotAnswer } from '#shared/schemas/lots.ts';
import type { LotEvent } from '#server/models/lot-event.ts';

const WHO: Readonly<Record<LotEvent['actorKind'], string>> = {
  seller: 'Seller',
  buyer: 'Buyer',
  desk: 'Assay desk',
  house: 'Scruple',
};

/** What a passer-by may know of a lot's life; drafting and the desk's letters are between seller and desk. */
const PUBLIC_ACTS: ReadonlySet<string> = new Set([
  'opened',
  'price-changed',
  'paused',
  'reopened',
  'reserved',
  'price-fixed',
  'fix-ran-out',
  'fix-given-up',
]);

/** A reason is for the seller and the desk; that a price has changed is for all. */
function noteOf(event: LotEvent, isInside: boolean): string | null {
  const detail = event.detail as
    ({ reason?: unknown; from?: unknown; to?: unknown } & Record<string, unknown>) | null;
  if (isInside && typeof detail?.reason === 'string') return detail.reason;
  if (event.act === 'price-changed' && typeof detail?.from === 'string' && typeof detail.to === 'string') {
    return `US$ ${detail.from} → US$ ${detail.to}`;
  }
  if (event.act === 'price-changed' && typeof detail?.fromPercent === 'string') {
    return `linked ${detail.fromPercent} % → ${String(detail.toPercent)} %`;
  }
  return null;
}

export function presentHistory(events: readonly LotEvent[], isInside: boolean): LotAnswer['history'] {
  return events
    .filter((event) => isInside || PUBLIC_ACTS.has(event.act))
    .map((event) => ({
      at: event.at.toISOString(),
      act: event.act,
      who: WHO[event.actorKind],
      note: noteOf(event, isInside),
    }));
}

import { formatPercent } from '../../lib/format.ts';
import type { MeltBand, MeltMark, MeltMarkKind } from './melt-rule-geometry.ts';

export const markNames: Record<MeltMarkKind, string> = {
  price: 'price',
  linked: 'linked',
  leading: 'leading',
  reserve: 'reserve',
  limit: 'your limit',
  floor: 'floor',
};

export function markLabel(mark: MeltMark): string {
  return `${markNames[mark.kind]} ${formatPercent(mark.percent)}`;
}

export function bandLabel(band: MeltBand): string {
  return `95 % range ${formatPercent(band.low).replace(/.%$/u, '')} to ${formatPercent(band.high)}`;
}

/** All that the drawing says, in words. */
export function ruleText(band: MeltBand | null, marks: MeltMark[]): string {
  const said = marks.map((mark) => `${markLabel(mark)} of melt`);
  if (band) said.push(`${bandLabel(band)} of melt`);
  return `Melt rule: ${said.length > 0 ? said.join('; ') : 'melt value at 100 %, nothing else stands on it'}.`;
}

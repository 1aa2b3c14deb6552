import { CAUTIONS } from '#shared/rules.ts';
import type { LotDraft } from '#shared/schemas/lots.ts';

const POISONS = ['Cd', 'Pb', 'Hg', 'As', 'Be'];

/** What a seller must know about this lot, by its form and by what it is made of. */
export function cautionsOfLot(draft: Pick<LotDraft, 'form' | 'contents'>): string[] {
  const metals = draft.contents.map((row) => row.metal);
  return [
    ...(CAUTIONS.byForm[draft.form] ?? []),
    ...(metals.includes('Ag') ? [CAUTIONS.silver] : []),
    ...(metals.some((metal) => POISONS.includes(metal)) ? [CAUTIONS.toxic] : []),
    ...CAUTIONS.everyLot,
  ];
}

import type { LotDraft } from '#shared/schemas/lots.ts';

const EVERY_LOT = [
  'Acids and their fumes burn skin, eyes and lungs. Nothing that still holds acid may be posted; most carriers also refuse wet, oily or dusty goods.',
  'A density alone proves no gold: tungsten has the same.',
  'Send it insured for the full price, by a carrier that takes precious metal. Many do not, or only up to a sum.',
  'Dealing in or refining precious metal may need a licence where you live. Hallmarking, second-hand-goods and money-laundering rules may apply, and tax: Scruple computes none.',
];

const BY_FORM: Record<string, string[]> = {
  button: [
    'A button can hold residual acid or chloride in pores and under slag. Melt, boil out, rinse and dry it before you weigh it.',
  ],
  bar: [
    'A bar with a mark that imitates a refiner’s is a matter for the police, whatever its fineness. Say who cast it.',
  ],
  grain: [
    'Grain and powder hold water, acid and chloride between their pieces. Rinse until neutral and dry to constant mass.',
  ],
};

const SILVER =
  'Silver that met ammonia or azides can form compounds that explode when dry. Never post silver residue that was not melted.';
const TOXIC =
  'Cadmium, lead, mercury, arsenic and beryllium are poisonous as fume and dust. Say in the description that they are there.';
const POISONS = ['Cd', 'Pb', 'Hg', 'As', 'Be'];

/** What a seller must know about this lot, by its form and by what it is made of. */
export function cautionsOfLot(draft: Pick<LotDraft, 'form' | 'contents'>): string[] {
  const metals = draft.contents.map((row) => row.metal);
  return [
    ...(BY_FORM[draft.form] ?? []),
    ...(metals.includes('Ag') ? [SILVER] : []),
    ...(metals.some((metal) => POISONS.includes(metal)) ? [TOXIC] : []),
    ...EVERY_LOT,
  ];
}

import type { ReadingUnit } from '#shared/mass-in-units.ts';
import type { DraftContent, LotDraft } from '#shared/schemas/lots.ts';

/** A blank row of the assay. */
export function blankContent(paidFor: boolean): DraftContent {
  return {
    metal: '',
    fineness: { value: '', unit: 'permille' },
    uncertainty: { value: '', unit: 'permille' },
    method: '',
    paidFor,
  };
}

const withUnit = (quantity: { value: string; unit: string }, unit: string) =>
  quantity.value === '' && quantity.unit === '' ? { value: '', unit } : quantity;

/** A draft as the form opens it: blank quantities get the reader's unit, an empty assay its first row. */
export function startingDraft(draft: LotDraft, unit: ReadingUnit): LotDraft {
  return {
    ...draft,
    gross: withUnit(draft.gross, unit),
    readability: withUnit(draft.readability, draft.gross.unit === '' ? unit : draft.gross.unit),
    contents: draft.contents.length > 0 ? draft.contents : [blankContent(true)],
    certificate: {
      ...draft.certificate,
      itemMass: withUnit(draft.certificate.itemMass, draft.gross.unit === '' ? unit : draft.gross.unit),
    },
  };
}

import { z } from 'zod';
import { DESCRIPTION_LENGTH_MAX, REGISTER_PAGE_SIZE, TITLE_LENGTH_MAX } from '../limits.ts';
import type { SettlementSheet } from '../settlement/sheet-types.ts';
import { decimalString, instant, lotCode, metalSchema, moneySchema, quantitySchema } from './common.ts';

export const REFINED_FORMS = ['button', 'bar', 'grain'] as const;
export const refinedFormSchema = z.enum(REFINED_FORMS);
export const EVIDENCE_GRADE_VALUES = ['certified', 'examined', 'declared'] as const;
export const SAMPLING_VALUES = ['laboratory', 'whole_piece', 'customer', 'not_stated'] as const;

const text = (max: number) => z.string().max(max).default('');
const draftQuantity = z.object({ value: text(40), unit: text(12) }).prefault({});

/** One metal of the assay as typed; the report's own figures are typed apart, so that the desk can compare. */
export const draftContent = z.object({
  metal: text(4),
  fineness: draftQuantity,
  uncertainty: draftQuantity,
  method: text(32),
  paidFor: z.boolean().default(false),
});
export type DraftContent = z.infer<typeof draftContent>;

export const draftReportResult = z.object({
  element: text(4),
  fineness: draftQuantity,
  uncertainty: draftQuantity,
  method: text(32),
});

export const draftCertificate = z.object({
  fileId: z.uuid().nullable().default(null),
  fileName: text(255),
  laboratoryId: z.uuid().nullable().default(null),
  laboratoryName: text(120),
  number: text(60),
  issuedOn: text(10),
  receivedOn: text(10),
  testedOn: text(10),
  sampling: text(20),
  itemDescription: text(200),
  itemMass: draftQuantity,
  itemMark: text(120),
  authorisedBy: text(120),
  results: z.array(draftReportResult).max(20).default([]),
});
export type DraftCertificate = z.infer<typeof draftCertificate>;

/** A draft keeps what was typed, right or wrong; `lotProblems` says what is missing for submission. */
export const lotDraft = z.object({
  form: text(20),
  title: text(TITLE_LENGTH_MAX),
  description: text(DESCRIPTION_LENGTH_MAX),
  gross: draftQuantity,
  readability: draftQuantity,
  contents: z.array(draftContent).max(20).default([]),
  /** `outright`, which blank means too, or `linked`. */
  pricing: text(12),
  price: text(20),
  /** Share of melt in %, of a linked lot. */
  linkedPercent: text(20),
  /** Least share of melt in % that an outright price may come down to while the metal rises; blank: none. */
  floorPercent: text(20),
  shipping: text(20),
  destinations: z.array(z.string().max(2)).max(60).default([]),
  closesOn: text(10),
  certificate: draftCertificate.prefault({}),
  confirmsCautions: z.boolean().default(false),
  confirmsTitle: z.boolean().default(false),
});
export type LotDraft = z.infer<typeof lotDraft>;

export const saveDraftRequest = z.object({ draft: lotDraft, version: z.number().int().min(0) });
export type SaveDraftRequest = z.infer<typeof saveDraftRequest>;

/** A sum for an outright lot, a share of melt for a linked one. */
export const priceRequest = z
  .object({ price: decimalString.optional(), linkedPercent: decimalString.optional() })
  .refine(({ price, linkedPercent }) => (price === undefined) !== (linkedPercent === undefined), {
    path: ['price'],
    message: 'Give a sum or a share of melt',
  });
export type PriceRequest = z.infer<typeof priceRequest>;
export const reasonRequest = z.object({
  reason: z.string().trim().min(5, 'Give a reason in a few words').max(1000),
});
export const photoOrderRequest = z.object({ photoIds: z.array(z.uuid()).max(12) });
export const photoCaptionRequest = z.object({ caption: z.string().max(200) });

export const lotParams = z.object({ code: lotCode });

/** Sheets are figures with their working; their shape is the engine's (`settlement/sheet-types.ts`). */
export const sheetSchema = z.record(z.string(), z.unknown()) as unknown as z.ZodType<SettlementSheet>;

export const photoAnswer = z.object({
  id: z.uuid(),
  caption: z.string(),
  isDrawing: z.boolean(),
  thumb: z.string(),
  medium: z.string(),
  large: z.string(),
  width: z.number().int(),
  height: z.number().int(),
});
export type PhotoAnswer = z.infer<typeof photoAnswer>;

export const contentAnswer = z.object({
  element: z.string(),
  fineness: quantitySchema,
  finenessPermille: decimalString,
  uncertaintyPermille: decimalString,
  isUncertaintyAssumed: z.boolean(),
  method: z.string(),
  isPaidFor: z.boolean(),
});
export type ContentAnswer = z.infer<typeof contentAnswer>;

/** What is public of a certificate: the entered fields, never the document, its customer or its address. */
export const certificatePublicAnswer = z.object({
  laboratoryName: z.string(),
  accreditation: z.string().nullable(),
  number: z.string(),
  issuedOn: z.iso.date(),
  sampling: z.enum(SAMPLING_VALUES),
  itemMass: quantitySchema.nullable(),
  itemMark: z.string().nullable(),
  results: z.array(
    z.object({
      element: z.string(),
      finenessPermille: decimalString,
      uncertaintyPermille: decimalString.nullable(),
      method: z.string(),
    }),
  ),
  state: z.enum(['submitted', 'claimed', 'verified', 'examined', 'returned', 'superseded']),
  /** "compared and confirmed by the desk; the metal was not tested by Scruple", or what else was done. */
  deskNote: z.string(),
  decidedAt: instant.nullable(),
  documentUrl: z.string().nullable(),
});

export const lotEventAnswer = z.object({
  at: instant,
  act: z.string(),
  who: z.string(),
  note: z.string().nullable(),
});

/** Why linked prices wait: the market is closed until then, a quote is stale, or there is none. */
export const priceWait = z.object({ reason: z.enum(['closed', 'stale', 'none']), until: instant.nullable() });
export type PriceWait = z.infer<typeof priceWait>;

export const PRICING_BASES = ['outright', 'linked', 'ascending', 'tender'] as const;

/** The fix that holds a lot now: until when for everyone, the sum only for who holds it. */
export const lotPriceFix = z.object({
  isMine: z.boolean(),
  until: instant,
  price: moneySchema.nullable(),
});

export const lotCan = z.object({
  edit: z.boolean(),
  submit: z.boolean(),
  redraft: z.boolean(),
  changePrice: z.boolean(),
  withdraw: z.boolean(),
  pause: z.boolean(),
  reopen: z.boolean(),
  copy: z.boolean(),
  buy: z.boolean(),
  fixPrice: z.boolean(),
  giveUpFix: z.boolean(),
  pull: z.boolean(),
});

export const netByMethod = z.object({
  method: z.enum(['card', 'bank_debit']),
  percent: decimalString,
  minimum: moneySchema,
  commission: moneySchema,
  net: moneySchema,
});

export const lotAnswer = z.object({
  code: lotCode,
  state: z.enum([
    'draft',
    'submitted',
    'returned',
    'open',
    'reserved',
    'sold',
    'paused',
    'closed',
    'withdrawn',
  ]),
  version: z.number().int(),
  form: z.string().nullable(),
  title: z.string(),
  description: z.string(),
  region: z.string(),
  isMine: z.boolean(),
  seller: z.object({ region: z.string(), completedDeals: z.number().int() }),
  gross: quantitySchema.extend({ grams: decimalString }).nullable(),
  readability: quantitySchema.nullable(),
  contents: z.array(contentAnswer),
  evidenceGrade: z.enum(EVIDENCE_GRADE_VALUES),
  certificate: certificatePublicAnswer.nullable(),
  pricingBasis: z.enum(PRICING_BASES),
  /** The sum, or what a linked lot's share of melt comes to at the newest accepted quotes; null without a quote. */
  price: moneySchema.nullable(),
  linkedPercent: decimalString.nullable(),
  /** Only for the seller and the desk. */
  floorPercent: decimalString.nullable(),
  /** Why a linked price cannot be fixed now; null where it can, and for lots that are not linked. */
  priceWait: priceWait.nullable(),
  priceFix: lotPriceFix.nullable(),
  shipping: moneySchema.nullable(),
  destinations: z.array(z.string()),
  closesAt: instant.nullable(),
  openedAt: instant.nullable(),
  photos: z.array(photoAnswer),
  /** The buyer's estimated sheet at the newest accepted quotes; null where there is no quote or the lot is not priced. */
  sheet: sheetSchema.nullable(),
  sellerSheet: sheetSchema.nullable(),
  nets: z.array(netByMethod),
  quoteState: z.enum(['fresh', 'partly', 'stale', 'closed', 'none']),
  stateReason: z.string().nullable(),
  history: z.array(lotEventAnswer),
  /** The deal that holds this lot, only for its two sides. */
  dealCode: z.string().nullable(),
  draft: lotDraft.nullable(),
  can: lotCan,
});
export type LotAnswer = z.infer<typeof lotAnswer>;

export const REGISTER_SORTS = ['newest', 'percent-of-melt', 'fine-content'] as const;

/** Filters and sort of the register as they stand in the address. Percent of melt and contents are inclusive bounds. */
export const registerQuery = z.object({
  metal: metalSchema.optional(),
  form: z.enum(['button', 'bar', 'grain', 'karat_scrap', 'plated_scrap', 'e_scrap', 'sweeps']).optional(),
  grade: z.enum(EVIDENCE_GRADE_VALUES).optional(),
  finenessMin: decimalString.optional(),
  finenessMax: decimalString.optional(),
  fineGramsMin: decimalString.optional(),
  fineGramsMax: decimalString.optional(),
  percentMin: decimalString.optional(),
  percentMax: decimalString.optional(),
  destination: z
    .string()
    .regex(/^[A-Z]{2}$/)
    .optional(),
  sort: z.enum(REGISTER_SORTS).default('newest'),
  cursor: z.string().max(400).optional(),
  limit: z.coerce.number().int().min(1).max(50).default(REGISTER_PAGE_SIZE),
});
export type RegisterQuery = z.infer<typeof registerQuery>;

export const registerRow = z.object({
  code: lotCode,
  title: z.string(),
  form: z.string(),
  region: z.string(),
  evidenceGrade: z.enum(EVIDENCE_GRADE_VALUES),
  gross: quantitySchema.extend({ grams: decimalString }),
  mainMetal: metalSchema,
  finenessPermille: decimalString,
  uncertaintyPermille: decimalString,
  fineGrams: decimalString,
  fineTroyOunces: decimalString,
  /** The sum, or what the share of melt of a linked lot comes to at the newest accepted quotes. */
  price: moneySchema.nullable(),
  linkedPercent: decimalString.nullable(),
  priceWait: priceWait.nullable(),
  settlesOn: z.enum(['stated', 'final']),
  /** Melt value now with its 95 % range; null without a quote. */
  melt: z.object({ value: decimalString, lowPercent: decimalString, highPercent: decimalString }).nullable(),
  percentOfMelt: decimalString.nullable(),
  closesAt: instant.nullable(),
  thumb: z.string().nullable(),
  isMine: z.boolean(),
});
export type RegisterRow = z.infer<typeof registerRow>;

export const registerAnswer = z.object({
  rows: z.array(registerRow),
  nextCursor: z.string().nullable(),
  count: z.number().int(),
  /** True when the count stopped at its limit: "more than 1,000". */
  isCountCapped: z.boolean(),
  quoteState: z.enum(['fresh', 'partly', 'stale', 'closed', 'none']),
  quotedAt: instant.nullable(),
});
export type RegisterAnswer = z.infer<typeof registerAnswer>;

/** A linked price made a sum, at the quotes that it names. */
export const priceFixAnswer = z.object({
  lotCode,
  percent: decimalString,
  price: moneySchema,
  total: moneySchema,
  until: instant,
  quotes: z.array(
    z.object({
      id: z.string().nullable(),
      metal: metalSchema,
      usdPerTroyOunce: decimalString,
      at: instant.nullable(),
      source: z.string(),
    }),
  ),
});
export type PriceFixAnswer = z.infer<typeof priceFixAnswer>;

export const myLotsAnswer = z.object({
  lots: z.array(
    z.object({
      code: lotCode,
      state: lotAnswer.shape.state,
      title: z.string(),
      form: z.string().nullable(),
      price: moneySchema.nullable(),
      linkedPercent: decimalString.nullable(),
      thumb: z.string().nullable(),
      stateReason: z.string().nullable(),
      updatedAt: instant,
      dealCode: z.string().nullable(),
    }),
  ),
});
export type MyLotsAnswer = z.infer<typeof myLotsAnswer>;

/** The commission of each payment method that is valid now. */
export const feeScheduleAnswer = z.object({
  rates: z.array(
    z.object({
      method: netByMethod.shape.method,
      percent: decimalString,
      minimum: moneySchema,
      validFrom: instant,
    }),
  ),
});
export type FeeScheduleAnswer = z.infer<typeof feeScheduleAnswer>;

/** A certificate's document after upload: the draft already refers to it. */
export const certificateFileAnswer = z.object({
  fileId: z.uuid(),
  fileName: z.string(),
  mediaType: z.string(),
  byteCount: z.number().int(),
});
export type CertificateFileAnswer = z.infer<typeof certificateFileAnswer>;

export const photosAnswer = z.object({ photos: z.array(photoAnswer) });
export type PhotosAnswer = z.infer<typeof photosAnswer>;

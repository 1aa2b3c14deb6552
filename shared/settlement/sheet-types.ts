import type { FinenessEntry } from '../fineness.ts';
import type { MassEntry } from '../mass.ts';
import type { Metal, OtherElement } from '../metals.ts';
import type { AssayMethodKey } from '../assay/methods.ts';
import type { BalanceClass } from '../uncertainty.ts';

/** When a sheet is made: for a lot, for a deal, or for a deal that is settled. */
export type SheetMoment = 'estimated' | 'provisional' | 'final';

/** For whose eyes a sheet is made; the seller's carries the commission. */
export type SheetAudience = 'buyer' | 'seller';

/** One line of a sheet. All numbers are plain decimal strings; `amount` is signed, in US dollars. */
export type SheetLine = {
  key: string;
  kind: 'mass' | 'metal' | 'sum' | 'price' | 'charge' | 'total';
  label: string;
  quantity: { value: string; unit: string } | null;
  rate: { value: string; unit: string } | null;
  amount: string | null;
  working: string[];
};

/** A quote that a sheet rests on: US$ per troy ounce of fine metal, when and from where. */
export type QuoteRef = {
  id: string | null;
  metal: Metal;
  usdPerTroyOunce: string;
  at: string | null;
  source: string;
};

/** A value that was not given and is the default, and why. `field` is a JSON pointer into the input. */
export type AssumedValue = { field: string; value: string; reason: string };

/** The input whose uncertainty a share speaks of. */
export type ShareInput = 'mass' | `assay:${Metal}`;

/** Melt value with its band: value ± expanded (k = 2), and how much of the variance each input brings. */
export type MeltFigure = {
  value: string;
  low: string;
  high: string;
  expanded: string;
  expandedPercent: string;
  shares: { input: ShareInput; percent: string }[];
};

/** Fine content of one metal, shown to six decimals. */
export type FineFigure = { metal: Metal; grams: string; troyOunces: string };

/** The statement of how a price follows from mass, assay and quote; the same for screen, mail and PDF. */
export type SettlementSheet = {
  engineVersion: string;
  moment: SheetMoment;
  currency: 'USD';
  audience: SheetAudience;
  quotes: QuoteRef[];
  lines: SheetLine[];
  fine: FineFigure[];
  melt: MeltFigure;
  price: string | null;
  percentOfMelt: string | null;
  shipping: string | null;
  total: string | null;
  assumed: AssumedValue[];
};

/** One metal or element of an assay as entered. An element without a quote cannot be paid for. */
export type ContentEntry = {
  metal: Metal | OtherElement;
  fineness: FinenessEntry;
  uncertainty: FinenessEntry | null;
  method: AssayMethodKey;
  paidFor: boolean;
};

/** The commission terms a seller's sheet is made with: rate of one payment method and the least sum. */
export type CommissionTerms = { method: string; percent: string; minimum: string };

/** A price as it is agreed: a sum, or a share of the melt value that the sheet turns into a sum. */
export type SheetPrice = { amount: string } | { percent: string };

/** All that a sheet of a refined lot is computed from; stored as it is and recomputed from. */
export type RefinedSheetInput = {
  gross: MassEntry;
  readability: MassEntry | null;
  balanceClass?: BalanceClass | null | undefined;
  contents: ContentEntry[];
  quotes: QuoteRef[];
  price: SheetPrice | null;
  shipping: { amount: string } | null;
  commission: CommissionTerms | null;
  weightStep?: string | undefined;
  /** What else a reader must know of the input, such as a quote that was old: stands on the sheet as it is. */
  notes?: AssumedValue[] | undefined;
  moment: SheetMoment;
  audience: SheetAudience;
};

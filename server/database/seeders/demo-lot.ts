import type { PersonKey } from './demo-people.ts';

export type DemoContent = {
  metal: string;
  permille: string;
  uncertainty: string;
  method: string;
  paidFor: boolean;
};

export type DemoLot = {
  key: string;
  seller: PersonKey;
  form: 'button' | 'bar' | 'grain';
  title: string;
  description: string;
  mass: string;
  unit: string;
  readability: string;
  contents: readonly DemoContent[];
  /** Price as a percentage of the melt value of the day of writing, as a plain number. */
  percentOfMelt: string;
  /** Priced as that share of melt, which moves with the quote, instead of as a sum. */
  isLinked?: boolean;
  shipping: string;
  laboratory: 0 | 1 | 2;
  reportNumber: string;
  mark: string;
  /** Days ago that the lot was submitted; null: still a draft. */
  submitted: number | null;
  desk: 'verifies' | 'returns' | 'claims' | 'waits';
  photos: number;
  destinations?: readonly string[];
  /** Sampled by the customer: such a report cannot certify the lot. */
  sampledByCustomer?: boolean;
};

export const gold = (permille: string, uncertainty = '0.4', method = 'fire_assay'): DemoContent => ({
  metal: 'Au',
  permille,
  uncertainty,
  method,
  paidFor: true,
});
export const silver = (
  permille: string,
  paidFor = true,
  uncertainty = '0.8',
  method = 'titration',
): DemoContent => ({
  metal: 'Ag',
  permille,
  uncertainty,
  method,
  paidFor,
});
export const copper = (permille: string): DemoContent => ({
  metal: 'Cu',
  permille,
  uncertainty: '',
  method: 'xrf',
  paidFor: false,
});
export const platinum = (permille: string): DemoContent => ({
  metal: 'Pt',
  permille,
  uncertainty: '2.5',
  method: 'icp_pgm',
  paidFor: true,
});
export const palladium = (permille: string): DemoContent => ({
  metal: 'Pd',
  permille,
  uncertainty: '2.5',
  method: 'icp_pgm',
  paidFor: true,
});

/** What most lots of the demo share. */
export const common = { unit: 'g', shipping: '28.00', laboratory: 0, desk: 'verifies', photos: 2 } as const;

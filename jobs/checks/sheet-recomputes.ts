import { findDifferingSheets } from '#server/features/sheets/find-differing-sheets.ts';
import type { Check } from './check.ts';

export const sheetRecomputesCheck: Check = {
  name: 'sheet-recomputes',
  states: 'Every sheet recomputes from what it stores, to the cent, and comes to the sums of its deal.',
  find: findDifferingSheets,
};

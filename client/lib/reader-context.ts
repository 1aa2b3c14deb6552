import { createContext, useContext } from 'react';
import type { ReadingUnit } from '#shared/mass-in-units.ts';

/** How the person reading wants time and mass told; a visitor gets the browser's zone and grams. */
export type Reader = { timeZone: string; weightUnit: ReadingUnit };

export const visitorReader: Reader = {
  timeZone: Intl.DateTimeFormat().resolvedOptions().timeZone || 'UTC',
  weightUnit: 'g',
};

export const ReaderContext = createContext<Reader>(visitorReader);

export function useReader(): Reader {
  return useContext(ReaderContext);
}

import { createContext, useContext } from 'react';
import type { MassUnit } from '#shared/mass.ts';

/** How the person reading wants time and mass told; a visitor gets the browser's zone and grams. */
export type Reader = { timeZone: string; massUnit: MassUnit };

export const visitorReader: Reader = {
  timeZone: Intl.DateTimeFormat().resolvedOptions().timeZone || 'UTC',
  massUnit: 'g',
};

export const ReaderContext = createContext<Reader>(visitorReader);

export function useReader(): Reader {
  return useContext(ReaderContext);
}

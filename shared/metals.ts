/** The metals that are quoted and can be paid for, in the order in which they are listed everywhere. */
export const METALS = ['Au', 'Ag', 'Pt', 'Pd'] as const;

/** A metal that is quoted and can be paid for, by its chemical symbol. */
export type Metal = (typeof METALS)[number];

/** Names of the quoted metals as a sentence starts with them. */
export const METAL_NAMES: Readonly<Record<Metal, string>> = {
  Au: 'Gold',
  Ag: 'Silver',
  Pt: 'Platinum',
  Pd: 'Palladium',
};

/** Names of the other elements that a report may give beside the metals paid for; they never carry a price here. */
export const OTHER_ELEMENT_NAMES = {
  Cu: 'Copper',
  Ni: 'Nickel',
  Zn: 'Zinc',
  Rh: 'Rhodium',
  Ir: 'Iridium',
  Ru: 'Ruthenium',
  Os: 'Osmium',
  Sn: 'Tin',
  Fe: 'Iron',
  Cd: 'Cadmium',
  Pb: 'Lead',
  Co: 'Cobalt',
  Ga: 'Gallium',
  In: 'Indium',
  W: 'Tungsten',
  Mn: 'Manganese',
  Al: 'Aluminium',
  Si: 'Silicon',
  Ti: 'Titanium',
  Cr: 'Chromium',
  As: 'Arsenic',
  Sb: 'Antimony',
  Bi: 'Bismuth',
  Se: 'Selenium',
  Te: 'Tellurium',
  Hg: 'Mercury',
  Be: 'Beryllium',
} as const;

/** An element found beside the metals paid for, by its chemical symbol. */
export type OtherElement = keyof typeof OTHER_ELEMENT_NAMES;

/** Symbols of the other elements, in the order of `OTHER_ELEMENT_NAMES`. */
export const OTHER_ELEMENTS = Object.keys(OTHER_ELEMENT_NAMES) as readonly OtherElement[];

/** True for a quoted metal. */
export function isMetal(symbol: string): symbol is Metal {
  return (METALS as readonly string[]).includes(symbol);
}

/** True for an element that can only be found beside the metals paid for. */
export function isOtherElement(symbol: string): symbol is OtherElement {
  return Object.hasOwn(OTHER_ELEMENT_NAMES, symbol);
}

/** The English name of any element that a report may give. */
export function elementName(symbol: Metal | OtherElement): string {
  return isMetal(symbol) ? METAL_NAMES[symbol] : OTHER_ELEMENT_NAMES[symbol];
}

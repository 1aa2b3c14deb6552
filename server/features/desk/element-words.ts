import { elementName, isMetal, isOtherElement } from '#shared/metals.ts';

/** The name of an element as stored; a symbol that the engine does not know stays as it is. */
export function nameOfElement(symbol: string): string {
  return isMetal(symbol) || isOtherElement(symbol) ? elementName(symbol) : symbol;
}

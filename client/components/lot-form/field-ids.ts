/** Errors speak of a place in the draft that has no control of its own: these are the controls that answer for it. */
const ALIASES: [RegExp, string][] = [
  [/^\/(gross|readability)$/, '/$1/value'],
  [/^\/certificate\/laboratoryId$/, '/certificate/laboratory'],
  [/^\/destinations\/.*$/, '/destinations'],
  [/^(.*\/(?:fineness|uncertainty|itemMass))$/, '$1/value'],
];

/** The control that a JSON pointer into the draft belongs to. */
export function fieldIdOf(pointer: string): string {
  const found = ALIASES.find(([pattern]) => pattern.test(pointer));
  const place = found ? pointer.replace(found[0], found[1]) : pointer;
  return `lot${place.replaceAll('/', '-')}`;
}

/** What stands in the draft under a JSON pointer; undefined where there is nothing. */
export function valueAt(root: unknown, pointer: string): unknown {
  return pointer
    .split('/')
    .slice(1)
    .reduce<unknown>((place, key) => {
      if (typeof place !== 'object' || place === null) return undefined;
      return (place as Record<string, unknown>)[key];
    }, root);
}

/** True for a field that was never filled in: nothing is called wrong there until the lot is handed in. */
export function isBlank(value: unknown): boolean {
  if (Array.isArray(value)) return value.length === 0;
  if (typeof value === 'object' && value !== null && 'value' in value) return isBlank(value.value);
  return value === undefined || value === null || value === false || value === '';
}

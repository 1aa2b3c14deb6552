const known = new Set(['UTC', ...Intl.supportedValuesOf('timeZone')]);

export function isTimeZone(name: string): boolean {
  return known.has(name);
}

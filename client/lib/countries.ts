const names = new Intl.DisplayNames(['en'], { type: 'region', fallback: 'code' });

/** 'Canada' for 'CA'; a code that names no country stays as it is. */
export function countryName(code: string): string {
  try {
    return names.of(code) ?? code;
  } catch {
    return code;
  }
}

/** Codes with their names, in the order of the names. */
export function countriesByName(codes: readonly string[]): { code: string; name: string }[] {
  return codes
    .map((code) => ({ code, name: countryName(code) }))
    .sort((left, right) => left.name.localeCompare(right.name, 'en'));
}

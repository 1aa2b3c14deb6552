/** Joins class names, leaving out what does not apply. */
export function cx(...names: unknown[]): string {
  return names.filter((name) => typeof name === 'string' && name !== '').join(' ');
}

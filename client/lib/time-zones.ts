/** Zones that a member can choose, by their names in the IANA list, UTC first. */
export const TIME_ZONES: readonly string[] = [
  'UTC',
  ...Intl.supportedValuesOf('timeZone').filter((zone) => zone !== 'UTC'),
];

/** The browser's own zone where it is one of the list, or UTC. */
export function guessedTimeZone(): string {
  const { timeZone } = Intl.DateTimeFormat().resolvedOptions();
  return TIME_ZONES.includes(timeZone) ? timeZone : 'UTC';
}

/** 'America/Argentina/Buenos Aires': the name with its underscores read as spaces. */
export function timeZoneName(zone: string): string {
  return zone.replaceAll('_', ' ');
}

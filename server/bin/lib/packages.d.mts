export type LockedPackages = Record<
  string,
  { version?: string; optional?: boolean; peer?: boolean; link?: boolean }
>;
export function whyPackagesAreStale(
  wanted: LockedPackages,
  installed: LockedPackages | undefined,
): string | undefined;

/** Leaves the application for a hosted page, by a full navigation. */
export function leaveTo(url: string): void {
  window.location.assign(url);
}

const DAY = /^\d{4}-\d{2}-\d{2}$/;
const DAY_MILLIS = 86_400_000;

/** True for an ISO calendar day that exists: `2026-02-29` does not. */
export function isCalendarDay(text: string): boolean {
  if (!DAY.test(text)) return false;
  const moment = new Date(`${text}T00:00:00.000Z`);
  return !Number.isNaN(moment.getTime()) && moment.toISOString().slice(0, 10) === text;
}

/** The UTC calendar day of an instant. */
export function dayOf(moment: Date): string {
  return moment.toISOString().slice(0, 10);
}

/** An instant some whole days (24 h) later. */
export function daysLater(moment: Date, days: number): Date {
  return new Date(moment.getTime() + days * DAY_MILLIS);
}

/** The first instant after a UTC calendar day has ended. */
export function endOfDay(day: string): Date {
  return daysLater(new Date(`${day}T00:00:00.000Z`), 1);
}

import { describe, expect, it } from 'vitest';
import { dayOf, daysLater, endOfDay, isCalendarDay } from './calendar-day.ts';

describe('a calendar day', () => {
  it.each(['2026-12-01', '2028-02-29', '1999-12-31'])('%s exists', (day) => {
    expect(isCalendarDay(day)).toBe(true);
  });

  it.each([
    '2026-02-29',
    '2026-13-01',
    '2026-00-10',
    '2026-04-31',
    '2026-1-1',
    '01.12.2026',
    '',
    '2026-12-01T00:00',
  ])('%j does not', (day) => {
    expect(isCalendarDay(day)).toBe(false);
  });

  it('is that of UTC', () => {
    expect(dayOf(new Date('2026-12-01T23:59:59.999Z'))).toBe('2026-12-01');
    expect(dayOf(new Date('2026-12-02T01:00:00+02:00'))).toBe('2026-12-01');
  });

  it('ends where the next begins, also at the end of a year', () => {
    expect(endOfDay('2026-12-31').toISOString()).toBe('2027-01-01T00:00:00.000Z');
  });

  it('lies whole days of 24 hours before or after', () => {
    const moment = new Date('2026-12-01T12:30:00.000Z');
    expect(daysLater(moment, 90).toISOString()).toBe('2027-03-01T12:30:00.000Z');
    expect(daysLater(moment, -10).toISOString()).toBe('2026-11-21T12:30:00.000Z');
  });
});

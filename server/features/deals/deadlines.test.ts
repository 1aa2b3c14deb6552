import { describe, expect, it } from 'vitest';
import {
  addBusinessDays,
  arriveByFrom,
  fundByFrom,
  inspectByFrom,
  ruleByFrom,
  shipByFrom,
} from './deadlines.ts';

const at = (text: string) => new Date(text);
const iso = (moment: Date) => moment.toISOString();

describe('business days', () => {
  it('count Monday to Friday and keep the time of day', () => {
    // 2026-12-01 is a Tuesday.
    expect(iso(addBusinessDays(at('2026-12-01T09:30:00.250Z'), 5, 'UTC'))).toBe('2026-12-08T09:30:00.250Z');
  });

  it.each([
    ['Friday', '2026-12-04T12:00:00.000Z', '2026-12-11T12:00:00.000Z'],
    ['Saturday', '2026-12-05T12:00:00.000Z', '2026-12-11T12:00:00.000Z'],
    ['Sunday', '2026-12-06T12:00:00.000Z', '2026-12-11T12:00:00.000Z'],
    ['Monday', '2026-12-07T12:00:00.000Z', '2026-12-14T12:00:00.000Z'],
  ])('five from a %s end on a working day', (_name, from, to) => {
    expect(iso(addBusinessDays(at(from), 5, 'UTC'))).toBe(to);
  });

  it('are those of the zone: late Friday in Denver is Saturday in UTC', () => {
    // Fri 4 Dec 20:00 in Denver (UTC-7): the first business day is Monday, the fifth Friday 11 Dec 20:00 there.
    expect(iso(addBusinessDays(at('2026-12-05T03:00:00.000Z'), 5, 'America/Denver'))).toBe(
      '2026-12-12T03:00:00.000Z',
    );
    expect(iso(addBusinessDays(at('2026-12-05T03:00:00.000Z'), 5, 'UTC'))).toBe('2026-12-11T03:00:00.000Z');
  });

  it('keep the local time when the clocks go forward in between', () => {
    // United States: 14 March 2027, 02:00 becomes 03:00. Thu 11 March 10:00 MST = 17:00Z; Thu 18 March 10:00 MDT = 16:00Z.
    expect(iso(addBusinessDays(at('2027-03-11T17:00:00.000Z'), 5, 'America/Denver'))).toBe(
      '2027-03-18T16:00:00.000Z',
    );
  });

  it('keep the local time when the clocks go back in between', () => {
    // Central Europe: 25 October 2026, 03:00 becomes 02:00. Wed 21 Oct 10:00 CEST = 08:00Z; Wed 28 Oct 10:00 CET = 09:00Z.
    expect(iso(addBusinessDays(at('2026-10-21T08:00:00.000Z'), 5, 'Europe/Vienna'))).toBe(
      '2026-10-28T09:00:00.000Z',
    );
  });

  it('cross a leap day', () => {
    // 2028-02-25 is a Friday; 29 February 2028 exists.
    expect(iso(addBusinessDays(at('2028-02-25T12:00:00.000Z'), 5, 'UTC'))).toBe('2028-03-03T12:00:00.000Z');
  });
});

describe('deadlines of a deal', () => {
  const start = at('2026-12-01T09:00:00.000Z');

  it('are 35 minutes, 5 business days, then days of 24 hours', () => {
    expect(iso(fundByFrom(start))).toBe('2026-12-01T09:35:00.000Z');
    expect(iso(shipByFrom(start, 'UTC'))).toBe('2026-12-08T09:00:00.000Z');
    expect(iso(arriveByFrom(start))).toBe('2026-12-11T09:00:00.000Z');
    expect(iso(inspectByFrom(start))).toBe('2026-12-06T09:00:00.000Z');
    expect(iso(ruleByFrom(start))).toBe('2026-12-08T09:00:00.000Z');
  });
});

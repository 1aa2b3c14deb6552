/** Narrow no-break space: stands between a figure and its unit. */
export const THIN = '\u202f';
const NBSP = '\u00a0';
const MINUS = '\u2212';

const PLAIN_DECIMAL = /^(-?)(\d+)(?:\.(\d+))?$/;

type Digits = { negative: boolean; whole: string; fraction: string };

function digitsOf(value: string): Digits {
  const match = PLAIN_DECIMAL.exec(value);
  if (!match) throw new RangeError(`"${value}" is not a plain decimal`);
  return { negative: match[1] === '-', whole: match[2] ?? '0', fraction: match[3] ?? '' };
}

function grouped(whole: string): string {
  return whole.replace(/\B(?=(\d{3})+$)/g, ',');
}

/** Groups the digits of a plain decimal and changes nothing else: '-4121.350' becomes '−4,121.350'. */
export function formatDecimal(value: string): string {
  const { negative, whole, fraction } = digitsOf(value);
  return `${negative ? MINUS : ''}${grouped(whole)}${fraction ? `.${fraction}` : ''}`;
}

/** A sum with at least two digits after the dot; further digits, as in a rate, stay. Nothing is rounded. */
export function formatAmount(value: string): string {
  const { negative, whole, fraction } = digitsOf(value);
  return `${negative ? MINUS : ''}${grouped(whole)}.${fraction.padEnd(2, '0')}`;
}

/** 'US$ 4,121.35'. All money is in US dollars. */
export function formatMoney(value: string): string {
  const amount = formatAmount(value);
  return amount.startsWith(MINUS) ? `${MINUS}US$${NBSP}${amount.slice(1)}` : `US$${NBSP}${amount}`;
}

/** Cuts to three figures, outwards: the low end down, the high end up, so that a range never looks narrower than it is. */
function threeFigures(value: string, direction: 'down' | 'up'): string {
  const { whole, fraction } = digitsOf(value);
  const stripped = whole.replace(/^0+(?=\d)/, '');
  const keepDecimals = stripped === '0' ? 2 : Math.max(0, Math.min(2, 3 - stripped.length));
  const scaled = BigInt(stripped + fraction.slice(0, keepDecimals).padEnd(keepDecimals, '0'));
  const step = 10n ** BigInt(Math.max(0, stripped.length - 3));
  const floor = (scaled / step) * step;
  const isExact = floor === scaled && /^0*$/.test(fraction.slice(keepDecimals));
  const text = (direction === 'up' && !isExact ? floor + step : floor)
    .toString()
    .padStart(keepDecimals + 1, '0');
  if (keepDecimals === 0) return grouped(text);
  return `${grouped(text.slice(0, -keepDecimals))}.${text.slice(-keepDecimals)}`;
}

/** 'US$ 4,160 to 4,180': a range of sums in three figures, rounded outwards. */
export function formatMoneyRange(low: string, high: string): string {
  return `US$${NBSP}${threeFigures(low, 'down')} to ${threeFigures(high, 'up')}`;
}

/** A figure and its unit: '0.996647 oz t'. */
export function formatQuantity(value: string, unit: string): string {
  return `${formatDecimal(value)}${THIN}${unit.replaceAll(' ', NBSP)}`;
}

/** '98.20 %' */
export function formatPercent(value: string): string {
  return `${formatDecimal(value)}${THIN}%`;
}

type MomentParts = {
  weekday: string;
  day: string;
  month: string;
  year: string;
  hour: string;
  minute: string;
  zone: string;
};

function momentParts(iso: string, timeZone: string): MomentParts {
  const format = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    weekday: 'short',
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
    timeZoneName: 'short',
  });
  const part = (type: Intl.DateTimeFormatPartTypes) =>
    format.formatToParts(new Date(iso)).find((found) => found.type === type)?.value ?? '';
  const month = part('month').slice(0, 3);
  return {
    weekday: part('weekday'),
    day: part('day'),
    month,
    year: part('year'),
    hour: part('hour'),
    minute: part('minute'),
    zone: part('timeZoneName'),
  };
}

/** '1 Dec 2026, 14:05 UTC' in the reader's zone. */
export function formatMoment(iso: string, timeZone: string): string {
  const at = momentParts(iso, timeZone);
  return `${at.day} ${at.month} ${at.year}, ${at.hour}:${at.minute}${NBSP}${at.zone}`;
}

/** '1 Dec 14:05', for a column whose head names the zone. */
export function formatShortMoment(iso: string, timeZone: string): string {
  const at = momentParts(iso, timeZone);
  return `${at.day} ${at.month} ${at.hour}:${at.minute}`;
}

/** '14:02', beside an age or a date. */
export function formatClock(iso: string, timeZone: string): string {
  const at = momentParts(iso, timeZone);
  return `${at.hour}:${at.minute}`;
}

/** 'UTC', 'CET' or 'GMT-3': what the zone is called at that moment. */
export function formatZone(iso: string, timeZone: string): string {
  return momentParts(iso, timeZone).zone;
}

/** '21 November 2026' of a plain date, which belongs to no zone. */
export function formatDate(isoDate: string): string {
  const format = new Intl.DateTimeFormat('en-GB', {
    timeZone: 'UTC',
    day: 'numeric',
    month: 'long',
    year: 'numeric',
  });
  return format.format(new Date(`${isoDate.slice(0, 10)}T00:00:00Z`));
}

const SECOND = 1_000;
const MINUTE = 60 * SECOND;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;

/** '40 s', '3 min', '2 h', '4 d': how long ago, in whole units. */
export function formatAge(iso: string, nowMs: number): string {
  const age = Math.max(0, nowMs - Date.parse(iso));
  if (age < MINUTE) return `${Math.floor(age / SECOND)}${NBSP}s`;
  if (age < HOUR) return `${Math.floor(age / MINUTE)}${NBSP}min`;
  if (age < DAY) return `${Math.floor(age / HOUR)}${NBSP}h`;
  return `${Math.floor(age / DAY)}${NBSP}d`;
}

/** '4 d 21 h', '3 h 5 min', '12 min', 'less than a minute'; null when the moment has passed. Never says more than is left. */
export function formatLeft(iso: string, nowMs: number): string | null {
  const left = Date.parse(iso) - nowMs;
  if (left <= 0) return null;
  const days = Math.floor(left / DAY);
  const hours = Math.floor((left % DAY) / HOUR);
  const minutes = Math.floor((left % HOUR) / MINUTE);
  if (days > 0) return `${days}${NBSP}d ${hours}${NBSP}h`;
  if (hours > 0) return `${hours}${NBSP}h ${minutes}${NBSP}min`;
  return minutes > 0 ? `${minutes}${NBSP}min` : 'less than a minute';
}

/** 'Fri 11 Dec, 11:20 UTC (4 d 21 h left)': both the moment and what is left of it. */
export function formatDeadline(iso: string, timeZone: string, nowMs: number): string {
  const at = momentParts(iso, timeZone);
  const left = formatLeft(iso, nowMs);
  return `${at.weekday} ${at.day} ${at.month}, ${at.hour}:${at.minute}${NBSP}${at.zone} (${left ? `${left} left` : 'passed'})`;
}

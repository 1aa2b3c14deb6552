import {
  QUOTE_ALARM_POLLS,
  QUOTE_CONFIRM_PERCENT,
  QUOTE_CONFIRM_POLLS,
  QUOTE_JUMP_PERCENT,
  QUOTE_STALE_SECONDS,
} from '#shared/limits.ts';
import { dec } from '#shared/decimal.ts';
import type { Metal } from '#shared/metals.ts';

export type Reading = { metal: Metal; mid: string; at: Date };
export type LastAccepted = { usdPerTroyOunce: string; quotedAt: Date };
export type Candidate = { usdPerTroyOunce: string; polls: number; confirmations: number };

export type Verdict =
  | { kind: 'accept' }
  | { kind: 'known' }
  | { kind: 'refuse'; reason: 'stale' | 'in-future' | 'older-than-accepted' }
  | { kind: 'quarantine'; candidate: Candidate; mustTellAdmin: boolean };

const CLOCK_TOLERANCE_MS = 60_000;

function isWithin(value: string, reference: string, percent: string): boolean {
  const change = dec(value).minus(reference).abs().times(100).div(reference);
  return change.lte(percent);
}

/**
 * What to do with one reading that has passed the shape check. Pure; the caller stores the outcome.
 *
 * A reading that jumps by more than the metal's limit from the last accepted value waits: when the next two polls stay
 * within 0.5 % of the quarantined value it is accepted, otherwise the newest becomes the candidate. Common practice for
 * feeds; the numbers are the house's own.
 */
export function judgeQuote(
  reading: Reading,
  last: LastAccepted | null,
  candidate: Candidate | null,
  now: Date,
  isMarketOpen: boolean,
): Verdict {
  const age = now.getTime() - reading.at.getTime();
  if (age < -CLOCK_TOLERANCE_MS) return { kind: 'refuse', reason: 'in-future' };
  if (last !== null && reading.at.getTime() === last.quotedAt.getTime()) return { kind: 'known' };
  if (isMarketOpen && age > QUOTE_STALE_SECONDS * 1000) return { kind: 'refuse', reason: 'stale' };
  if (last !== null && reading.at < last.quotedAt) return { kind: 'refuse', reason: 'older-than-accepted' };
  if (last === null || isWithin(reading.mid, last.usdPerTroyOunce, QUOTE_JUMP_PERCENT[reading.metal])) {
    return { kind: 'accept' };
  }
  if (candidate === null) return quarantine(reading, 1, 0);
  if (!isWithin(reading.mid, candidate.usdPerTroyOunce, QUOTE_CONFIRM_PERCENT)) {
    return quarantine(reading, candidate.polls + 1, 0);
  }
  const confirmations = candidate.confirmations + 1;
  if (confirmations >= QUOTE_CONFIRM_POLLS) return { kind: 'accept' };
  return quarantine({ ...reading, mid: candidate.usdPerTroyOunce }, candidate.polls + 1, confirmations);
}

function quarantine(reading: Reading, polls: number, confirmations: number): Verdict {
  return {
    kind: 'quarantine',
    candidate: { usdPerTroyOunce: reading.mid, polls, confirmations },
    mustTellAdmin: polls >= QUOTE_ALARM_POLLS,
  };
}

import { describe, expect, it } from 'vitest';
import { judgeQuote, type Candidate } from './judge-quote.ts';

const now = new Date('2026-12-01T12:00:00.000Z');
const secondsAgo = (seconds: number) => new Date(now.getTime() - seconds * 1000);
const gold = (mid: string, seconds = 5) => ({ metal: 'Au' as const, mid, at: secondsAgo(seconds) });
const last = { usdPerTroyOunce: '4000', quotedAt: secondsAgo(65) };

describe('judgeQuote', () => {
  it('accepts the first reading there ever was', () => {
    expect(judgeQuote(gold('4182.40'), null, null, now, true)).toEqual({ kind: 'accept' });
  });

  it('accepts a change at the limit and quarantines one just beyond it', () => {
    expect(judgeQuote(gold('4080'), last, null, now, true).kind).toBe('accept');
    expect(judgeQuote(gold('4080.01'), last, null, now, true).kind).toBe('quarantine');
    expect(judgeQuote(gold('3920'), last, null, now, true).kind).toBe('accept');
    expect(judgeQuote(gold('3919.99'), last, null, now, true).kind).toBe('quarantine');
  });

  it('allows silver twice the change that gold is allowed', () => {
    const silver = { metal: 'Ag' as const, at: secondsAgo(5) };
    const lastSilver = { usdPerTroyOunce: '50', quotedAt: secondsAgo(65) };
    expect(judgeQuote({ ...silver, mid: '52' }, lastSilver, null, now, true).kind).toBe('accept');
    expect(judgeQuote({ ...silver, mid: '52.01' }, lastSilver, null, now, true).kind).toBe('quarantine');
  });

  it('refuses a reading older than five minutes while the market is open, not while it is closed', () => {
    const old = { usdPerTroyOunce: '4000', quotedAt: secondsAgo(900) };
    expect(judgeQuote(gold('4001', 301), old, null, now, true)).toEqual({ kind: 'refuse', reason: 'stale' });
    expect(judgeQuote(gold('4001', 300), old, null, now, true).kind).toBe('accept');
    expect(judgeQuote(gold('4001', 301), old, null, now, false).kind).toBe('accept');
  });

  it('refuses a reading from the future and one older than the accepted', () => {
    expect(judgeQuote(gold('4001', -61), last, null, now, true)).toEqual({
      kind: 'refuse',
      reason: 'in-future',
    });
    expect(judgeQuote(gold('4001', 90), last, null, now, true)).toEqual({
      kind: 'refuse',
      reason: 'older-than-accepted',
    });
  });

  it('says that it knows a reading with the time of the accepted one', () => {
    expect(judgeQuote(gold('4000', 65), last, null, now, true)).toEqual({ kind: 'known' });
  });

  it('accepts a jump once the next two polls stay within half a percent of it', () => {
    const first = judgeQuote(gold('4400'), last, null, now, true);
    expect(first).toMatchObject({
      kind: 'quarantine',
      candidate: { usdPerTroyOunce: '4400', confirmations: 0 },
    });
    const candidate = (first as { candidate: Candidate }).candidate;
    const second = judgeQuote(gold('4420'), last, candidate, now, true);
    expect(second).toMatchObject({
      kind: 'quarantine',
      candidate: { usdPerTroyOunce: '4400', confirmations: 1 },
    });
    const third = judgeQuote(gold('4380'), last, (second as { candidate: Candidate }).candidate, now, true);
    expect(third).toEqual({ kind: 'accept' });
  });

  it('makes the newest the candidate when a poll does not confirm', () => {
    const candidate: Candidate = { usdPerTroyOunce: '4400', polls: 2, confirmations: 1 };
    expect(judgeQuote(gold('4422.01'), last, candidate, now, true)).toMatchObject({
      kind: 'quarantine',
      candidate: { usdPerTroyOunce: '4422.01', polls: 3, confirmations: 0 },
    });
  });

  it('accepts a reading that comes back to the accepted value although a candidate waits', () => {
    const candidate: Candidate = { usdPerTroyOunce: '8000', polls: 1, confirmations: 0 };
    expect(judgeQuote(gold('4010'), last, candidate, now, true)).toEqual({ kind: 'accept' });
  });

  it('asks for an admin after ten polls without confirmation', () => {
    const waiting = (polls: number): Candidate => ({ usdPerTroyOunce: '8000', polls, confirmations: 0 });
    expect(judgeQuote(gold('9000'), last, waiting(8), now, true)).toMatchObject({ mustTellAdmin: false });
    expect(judgeQuote(gold('9000'), last, waiting(9), now, true)).toMatchObject({ mustTellAdmin: true });
  });
});

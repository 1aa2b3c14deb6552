import { describe, expect, it } from 'vitest';
import { MeasureError } from './domain-error.ts';
import {
  LIVE_LOT_STATES,
  LOT_STATES,
  LOT_STATE_LABELS,
  LOT_TRANSITIONS,
  PUBLIC_LOT_STATES,
  assertLotTransition,
  canLotBecome,
  type LotState,
} from './lot-states.ts';

/** Every change that is allowed, written out; all others are refused. */
const ALLOWED = [
  'draft → submitted',
  'submitted → open',
  'submitted → returned',
  'submitted → withdrawn',
  'returned → draft',
  'open → reserved',
  'open → closed',
  'open → withdrawn',
  'open → paused',
  'paused → open',
  'paused → closed',
  'paused → withdrawn',
  'reserved → sold',
  'reserved → open',
  'sold → closed',
];

const pairs = LOT_STATES.flatMap((from) => LOT_STATES.map((to): [LotState, LotState] => [from, to]));

describe('lot states', () => {
  it.each(pairs)('from %s to %s follow the list', (from, to) => {
    const isAllowed = ALLOWED.includes(`${from} → ${to}`);
    expect(canLotBecome(from, to)).toBe(isAllowed);
    const change = () => assertLotTransition(from, to);
    if (isAllowed) expect(change).not.toThrow();
    else
      expect(change).toThrowError(expect.objectContaining({ code: 'illegal-transition', field: '/state' }));
  });

  it('never become what they are already', () => {
    for (const state of LOT_STATES) expect(canLotBecome(state, state)).toBe(false);
  });

  it('can all be reached from a draft', () => {
    const reached = new Set<LotState>(['draft']);
    for (const state of reached) for (const next of LOT_TRANSITIONS[state]) reached.add(next);
    expect([...reached].sort()).toEqual([...LOT_STATES].sort());
  });

  it('are worded, each in its own way', () => {
    const labels = LOT_STATES.map((state) => LOT_STATE_LABELS[state]);
    expect(new Set(labels).size).toBe(LOT_STATES.length);
    expect(() => assertLotTransition('sold', 'open')).toThrow('What is “Sold” cannot become “Open”.');
    expect(() => assertLotTransition('sold', 'open')).toThrow(MeasureError);
  });

  it('count an ended lot neither as live nor as public', () => {
    for (const state of LOT_STATES.filter((candidate) => LOT_TRANSITIONS[candidate].length === 0)) {
      expect(LIVE_LOT_STATES).not.toContain(state);
      expect(PUBLIC_LOT_STATES).not.toContain(state);
    }
    expect(PUBLIC_LOT_STATES.every((state) => LIVE_LOT_STATES.includes(state))).toBe(true);
  });
});

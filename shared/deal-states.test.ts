import { describe, expect, it } from 'vitest';
import {
  DEAL_STATES,
  DEAL_STATE_LABELS,
  DEAL_TRANSITIONS,
  HOLDING_DEAL_STATES,
  assertDealTransition,
  canDealBecome,
  isDealEnded,
  type DealState,
} from './deal-states.ts';

/** Every change that is allowed, written out; all others are refused. */
const ALLOWED = [
  'agreed → funded',
  'agreed → lapsed',
  'funded → shipped',
  'funded → cancelled',
  'shipped → delivered',
  'shipped → contested',
  'delivered → accepted',
  'delivered → contested',
  'delivered → exchange',
  'accepted → settled',
  'settled → paid_out',
  'paid_out → settled',
  'contested → settled',
  'contested → returning',
  'contested → cancelled',
  'returning → returned',
  'returning → contested',
  'returning → settled',
  'exchange → settled',
  'exchange → umpire',
  'exchange → contested',
  'exchange → returning',
  'umpire → settled',
  'umpire → contested',
  'umpire → returning',
];

const ENDED: DealState[] = ['returned', 'lapsed', 'cancelled', 'reversed'];
const REVERSIBLE = DEAL_STATES.filter((state) => state !== 'agreed' && !ENDED.includes(state));
const pairs = DEAL_STATES.flatMap((from) => DEAL_STATES.map((to): [DealState, DealState] => [from, to]));

describe('deal states', () => {
  it.each(pairs)('from %s to %s follow the list', (from, to) => {
    const isAllowed = ALLOWED.includes(`${from} → ${to}`) || (to === 'reversed' && REVERSIBLE.includes(from));
    expect(canDealBecome(from, to)).toBe(isAllowed);
    const change = () => assertDealTransition(from, to);
    if (isAllowed) expect(change).not.toThrow();
    else
      expect(change).toThrowError(expect.objectContaining({ code: 'illegal-transition', field: '/state' }));
  });

  it('lead along the plain road from agreement to payout', () => {
    const road: DealState[] = ['agreed', 'funded', 'shipped', 'delivered', 'accepted', 'settled', 'paid_out'];
    road.slice(1).forEach((next, index) => {
      expect(canDealBecome(road[index] ?? 'lapsed', next)).toBe(true);
    });
  });

  it('end four ways; a paid-out deal has not ended, for its payout may yet fail', () => {
    expect(DEAL_STATES.filter(isDealEnded).sort()).toEqual([...ENDED].sort());
    expect(isDealEnded('paid_out')).toBe(false);
  });

  it('let nobody hold money for ever: an end or a payout can be reached from everywhere', () => {
    for (const start of DEAL_STATES) {
      const reached = new Set<DealState>([start]);
      for (const state of reached) for (const next of DEAL_TRANSITIONS[state]) reached.add(next);
      expect([...reached].some((state) => state === 'paid_out' || ENDED.includes(state))).toBe(true);
    }
  });

  it('hold money from funded on, until it is settled or the deal has ended', () => {
    for (const state of HOLDING_DEAL_STATES) {
      expect(isDealEnded(state)).toBe(false);
      expect(canDealBecome(state, 'reversed')).toBe(true);
    }
    expect(HOLDING_DEAL_STATES).not.toContain('agreed');
    expect(HOLDING_DEAL_STATES).not.toContain('paid_out');
  });

  it('are worded, each in its own way', () => {
    expect(new Set(DEAL_STATES.map((state) => DEAL_STATE_LABELS[state])).size).toBe(DEAL_STATES.length);
    expect(() => assertDealTransition('lapsed', 'funded')).toThrow(
      'What is “Lapsed, not funded” cannot become “Funded”.',
    );
  });
});

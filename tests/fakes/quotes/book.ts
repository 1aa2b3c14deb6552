import { BadRequest } from '../kit/serve.ts';
import type { StateFile } from '../kit/state-file.ts';
import {
  centsText,
  createWalk,
  microsFromText,
  quotedCodes,
  raiseByHundredths,
  spread,
  stepMs,
  type QuotedCode,
} from './walk.ts';

export const codeScenarios = [
  'stale',
  'spike',
  'garbage-nan',
  'garbage-huge',
  'garbage-negative',
  'garbage-zero',
] as const;
export const serviceScenarios = [
  'slow',
  'down',
  'reset',
  'closed',
  'garbage-html',
  'garbage-currency',
] as const;
export type CodeScenario = (typeof codeScenarios)[number];
export type ServiceScenario = (typeof serviceScenarios)[number];

type Running<Name> = { name: Name; hundredths: string; pollsLeft: number | null };
export type QuoteBookState = {
  seed: number;
  startedAtMs: number;
  clockOffsetMs: number;
  pins: Partial<Record<QuotedCode, string>>;
  codes: Partial<Record<QuotedCode, Running<CodeScenario>>>;
  service: Running<ServiceScenario> | null;
  closure: { fromMs: number; untilMs: number } | null;
};

export function initialBookState(seed: number, startedAtMs: number): QuoteBookState {
  const start = Math.floor(startedAtMs / stepMs) * stepMs;
  return { seed, startedAtMs: start, clockOffsetMs: 0, pins: {}, codes: {}, service: null, closure: null };
}

export type ScenarioOrder = {
  scenario: string;
  code: QuotedCode | null;
  percent: string;
  polls: number | null;
};
export type QuoteEntry = { code: QuotedCode; bid: string; ask: string; mid: string; at: string };

const staleAgeMs = 20 * 60_000;
const closureMs = 8 * 3_600_000;
const historyDays = 60;
const dayMs = 86_400_000;
const fixingHourMs = 16 * 3_600_000;

function percentHundredths(percent: string): string {
  const match = /^([+-]?)(\d{1,3})(?:\.(\d{1,2}))?$/.exec(percent);
  if (!match) throw new BadRequest('percent: a decimal with at most two places');
  const size = BigInt(match[2] ?? '0') * 100n + BigInt((match[3] ?? '').padEnd(2, '0'));
  const signed = match[1] === '-' ? -size : size;
  if (signed <= -10_000n) throw new BadRequest('percent: above -100');
  return String(signed);
}

function nextFridayEvening(nowMs: number): number {
  const midnight = Math.floor(nowMs / dayMs) * dayMs;
  const evening = midnight + ((5 - new Date(nowMs).getUTCDay() + 7) % 7) * dayMs + 22 * 3_600_000;
  return evening > nowMs ? evening : evening + 7 * dayMs;
}

/** What the stand-in would quote now, and the orders that disturb it. */
export function createQuoteBook({ state, save }: StateFile<QuoteBookState>, systemNowMs: () => number) {
  const walk = createWalk(state.seed);
  const nowMs = () => systemNowMs() + state.clockOffsetMs;
  const stepAt = (ms: number) => Math.floor((ms - state.startedAtMs) / stepMs);
  const isClosed = () => state.closure !== null && nowMs() < state.closure.untilMs;
  const valueMs = () => (isClosed() && state.closure ? state.closure.fromMs : nowMs());

  function plainMid(code: QuotedCode): bigint {
    const pin = state.pins[code];
    return (pin && microsFromText(pin)) || walk.midMicros(code, stepAt(valueMs()));
  }

  function entry(code: QuotedCode): QuoteEntry {
    const running = state.codes[code];
    const isSpike = running?.name === 'spike';
    const mid = isSpike ? raiseByHundredths(plainMid(code), BigInt(running.hundredths)) : plainMid(code);
    const { bid, ask } = spread(code, mid);
    const at = new Date(valueMs() - (running?.name === 'stale' ? staleAgeMs : 0)).toISOString();
    const plain = { code, bid: centsText(bid), ask: centsText(ask), mid: centsText(mid), at };
    if (running?.name === 'garbage-nan') return { ...plain, mid: 'NaN' };
    if (running?.name === 'garbage-huge') return { ...plain, mid: '999999999999.00', ask: '999999999999.00' };
    if (running?.name === 'garbage-negative') return { ...plain, bid: `-${plain.bid}`, mid: `-${plain.mid}` };
    if (running?.name === 'garbage-zero') return { ...plain, bid: '0.00', mid: '0.00' };
    return plain;
  }

  function countPoll(codes: readonly QuotedCode[]) {
    const spent = (running: Running<unknown>) => {
      if (running.pollsLeft !== null) running.pollsLeft -= 1;
      return running.pollsLeft !== null && running.pollsLeft <= 0;
    };
    for (const code of codes) {
      const running = state.codes[code];
      if (running && spent(running)) delete state.codes[code];
    }
    save();
  }

  return {
    state,
    nowMs,
    market: () => ({
      open: !isClosed(),
      until: new Date(
        isClosed() && state.closure ? state.closure.untilMs : nextFridayEvening(nowMs()),
      ).toISOString(),
    }),
    entries: (codes: readonly QuotedCode[]) => codes.map(entry),
    countPoll,
    /** The fault of this request, counted against its polls. */
    takeServiceScenario(): ServiceScenario | null {
      const running = state.service;
      if (!running) return null;
      if (running.pollsLeft !== null) {
        running.pollsLeft -= 1;
        if (running.pollsLeft <= 0) state.service = null;
        save();
      }
      return running.name;
    },
    order({ scenario, code, percent, polls }: ScenarioOrder) {
      const codes = code ? [code] : quotedCodes;
      if (scenario === 'normal') {
        for (const each of codes) delete state.codes[each];
        if (!code) Object.assign(state, { service: null, closure: null, pins: {} });
      } else if ((codeScenarios as readonly string[]).includes(scenario)) {
        const hundredths = percentHundredths(percent);
        for (const each of codes)
          state.codes[each] = { name: scenario as CodeScenario, hundredths, pollsLeft: polls };
      } else if ((serviceScenarios as readonly string[]).includes(scenario)) {
        if (code) throw new BadRequest(`${scenario} concerns the whole service: leave out code`);
        if (scenario === 'closed') state.closure = { fromMs: nowMs(), untilMs: nowMs() + closureMs };
        else state.service = { name: scenario as ServiceScenario, hundredths: '0', pollsLeft: polls };
      } else throw new BadRequest(`unknown scenario "${scenario}"`);
      save();
    },
    /** Holds one value until it is released (null) or everything is set to normal. */
    pin(code: QuotedCode, mid: string | null) {
      if (mid === null) delete state.pins[code];
      else if (microsFromText(mid)) state.pins[code] = mid;
      else throw new BadRequest('mid: a positive decimal string');
      save();
    },
    advance(seconds: number) {
      state.clockOffsetMs += seconds * 1000;
      save();
    },
    history(code: QuotedCode, fromDay: number, toDay: number) {
      const oldest = Math.floor(state.startedAtMs / dayMs) - historyDays;
      const days: { date: string; mid: string; at: string }[] = [];
      for (let day = Math.max(fromDay, oldest); day <= toDay; day += 1) {
        const fixingMs = day * dayMs + fixingHourMs;
        if (fixingMs > nowMs()) break;
        const at = new Date(fixingMs).toISOString();
        days.push({ date: at.slice(0, 10), mid: centsText(walk.midMicros(code, stepAt(fixingMs))), at });
      }
      return days;
    },
  };
}

export type QuoteBook = ReturnType<typeof createQuoteBook>;

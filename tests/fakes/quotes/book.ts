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
  type Walk,
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

const isOneOf = <Name extends string>(names: readonly Name[], text: string): text is Name =>
  (names as readonly string[]).includes(text);

/** Counts one poll; true when that was the last. */
function isSpent(running: { pollsLeft: number | null }): boolean {
  if (running.pollsLeft === null) return false;
  running.pollsLeft -= 1;
  return running.pollsLeft <= 0;
}

/** What the stand-in would quote now, and the orders that disturb it. */
export class QuoteBook {
  readonly state: QuoteBookState;
  readonly #save: () => void;
  readonly #systemNowMs: () => number;
  readonly #walk: Walk;

  constructor(file: StateFile<QuoteBookState>, systemNowMs: () => number) {
    this.state = file.state;
    this.#save = file.save;
    this.#systemNowMs = systemNowMs;
    this.#walk = createWalk(file.state.seed);
  }

  nowMs(): number {
    return this.#systemNowMs() + this.state.clockOffsetMs;
  }

  #closure(): { fromMs: number; untilMs: number } | null {
    const { closure } = this.state;
    return closure && this.nowMs() < closure.untilMs ? closure : null;
  }

  #walkMid(code: QuotedCode, ms: number): bigint {
    return this.#walk.midMicros(code, Math.floor((ms - this.state.startedAtMs) / stepMs));
  }

  market(): { open: boolean; until: string } {
    const closure = this.#closure();
    const untilMs = closure ? closure.untilMs : nextFridayEvening(this.nowMs());
    return { open: closure === null, until: new Date(untilMs).toISOString() };
  }

  entries(codes: readonly QuotedCode[]): QuoteEntry[] {
    return codes.map((code) => this.#entry(code));
  }

  #entry(code: QuotedCode): QuoteEntry {
    const running = this.state.codes[code];
    const valueMs = this.#closure()?.fromMs ?? this.nowMs();
    const pin = this.state.pins[code];
    const calm = (pin && microsFromText(pin)) || this.#walkMid(code, valueMs);
    const mid = running?.name === 'spike' ? raiseByHundredths(calm, BigInt(running.hundredths)) : calm;
    const { bid, ask } = spread(code, mid);
    const at = new Date(valueMs - (running?.name === 'stale' ? staleAgeMs : 0)).toISOString();
    const plain = { code, bid: centsText(bid), ask: centsText(ask), mid: centsText(mid), at };
    if (running?.name === 'garbage-nan') return { ...plain, mid: 'NaN' };
    if (running?.name === 'garbage-huge') return { ...plain, mid: '999999999999.00', ask: '999999999999.00' };
    if (running?.name === 'garbage-negative') return { ...plain, bid: `-${plain.bid}`, mid: `-${plain.mid}` };
    if (running?.name === 'garbage-zero') return { ...plain, bid: '0.00', mid: '0.00' };
    return plain;
  }

  countPoll(codes: readonly QuotedCode[]) {
    for (const code of codes) {
      const running = this.state.codes[code];
      if (running && isSpent(running)) delete this.state.codes[code];
    }
    this.#save();
  }

  /** The fault of this request, counted against its polls. */
  takeServiceScenario(): ServiceScenario | null {
    const running = this.state.service;
    if (!running) return null;
    if (isSpent(running)) this.state.service = null;
    this.#save();
    return running.name;
  }

  order({ scenario, code, percent, polls }: ScenarioOrder) {
    const codes = code ? [code] : quotedCodes;
    if (scenario === 'normal') {
      for (const each of codes) delete this.state.codes[each];
      if (!code) Object.assign(this.state, { service: null, closure: null, pins: {} });
    } else if (isOneOf(codeScenarios, scenario)) {
      const hundredths = percentHundredths(percent);
      for (const each of codes) this.state.codes[each] = { name: scenario, hundredths, pollsLeft: polls };
    } else if (isOneOf(serviceScenarios, scenario)) {
      if (code) throw new BadRequest(`${scenario} concerns the whole service: leave out code`);
      const nowMs = this.nowMs();
      if (scenario === 'closed') this.state.closure = { fromMs: nowMs, untilMs: nowMs + closureMs };
      else this.state.service = { name: scenario, hundredths: '0', pollsLeft: polls };
    } else throw new BadRequest(`unknown scenario "${scenario}"`);
    this.#save();
  }

  /** Holds one value until it is released (null) or everything is set to normal. */
  pin(code: QuotedCode, mid: string | null) {
    if (mid === null) delete this.state.pins[code];
    else if (microsFromText(mid)) this.state.pins[code] = mid;
    else throw new BadRequest('mid: a positive decimal string');
    this.#save();
  }

  advance(seconds: number) {
    this.state.clockOffsetMs += seconds * 1000;
    this.#save();
  }

  /** Days are counted from 1970-01-01. A day whose fixing time has not come yet has no value. */
  history(code: QuotedCode, fromDay: number, toDay: number) {
    const oldest = Math.floor(this.state.startedAtMs / dayMs) - historyDays;
    const days: { date: string; mid: string; at: string }[] = [];
    for (let day = Math.max(fromDay, oldest); day <= toDay; day += 1) {
      const fixingMs = day * dayMs + fixingHourMs;
      if (fixingMs > this.nowMs()) break;
      const at = new Date(fixingMs).toISOString();
      days.push({ date: at.slice(0, 10), mid: centsText(this.#walkMid(code, fixingMs)), at });
    }
    return days;
  }
}

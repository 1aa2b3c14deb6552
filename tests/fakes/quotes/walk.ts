export const quotedCodes = ['XAU', 'XAG', 'XPT', 'XPD'] as const;
export type QuotedCode = (typeof quotedCodes)[number];

export const stepMs = 60_000;
const scale = 1_000_000n;
const partsPerBillion = 1_000_000_000n;

/** Invented opening values, the largest move of one minute, and half the distance from bid to ask. */
const figures: Record<QuotedCode, { startMicros: bigint; moveMaxPpb: number; halfSpreadPpb: bigint }> = {
  XAU: { startMicros: 4_182_400_000n, moveMaxPpb: 450_000, halfSpreadPpb: 550_000n },
  XAG: { startMicros: 52_350_000n, moveMaxPpb: 900_000, halfSpreadPpb: 1_000_000n },
  XPT: { startMicros: 1_604_000_000n, moveMaxPpb: 800_000, halfSpreadPpb: 2_500_000n },
  XPD: { startMicros: 1_432_000_000n, moveMaxPpb: 900_000, halfSpreadPpb: 3_000_000n },
};

function mix(seed: number, code: number, step: number): number {
  let value = (seed ^ Math.imul(code + 1, 0x9e3779b1) ^ Math.imul(step, 0x85ebca6b)) | 0;
  for (const factor of [0x7feb352d, 0x846ca68b]) {
    value ^= value >>> 16;
    value = Math.imul(value, factor);
    value ^= value >>> 15;
  }
  return value >>> 0;
}

/** Sum of two even draws: small moves are likelier than large ones. Symmetric about zero. */
function movePpb(seed: number, code: QuotedCode, step: number): bigint {
  const bits = mix(seed, quotedCodes.indexOf(code), step);
  const sum = (bits & 0xffff) + (bits >>> 16) - 0xffff;
  return BigInt(Math.trunc((figures[code].moveMaxPpb * sum) / 0xffff));
}

export type Walk = { midMicros: (code: QuotedCode, step: number) => bigint };

/**
 * The value at step 0 is the opening value; the move from step n to n + 1 depends on the seed and n alone, and
 * steps before 0 undo their moves, so the past is the same whenever it is asked for.
 */
export function createWalk(seed: number): Walk {
  const paths = new Map<string, bigint[]>();
  const pathOf = (code: QuotedCode, side: 'ahead' | 'back') => {
    const key = `${code} ${side}`;
    const known = paths.get(key);
    if (known) return known;
    const fresh = [figures[code].startMicros];
    paths.set(key, fresh);
    return fresh;
  };
  return {
    midMicros(code, step) {
      const isAhead = step >= 0;
      const path = pathOf(code, isAhead ? 'ahead' : 'back');
      const distance = Math.abs(step);
      let last = path[path.length - 1] ?? figures[code].startMicros;
      for (let at = path.length; at <= distance; at += 1) {
        const factor = partsPerBillion + movePpb(seed, code, isAhead ? at - 1 : -at);
        last = isAhead ? (last * factor) / partsPerBillion : (last * partsPerBillion) / factor;
        path.push(last);
      }
      return path[distance] ?? last;
    },
  };
}

/** Micro-dollars as a decimal string with two places, half away from zero. */
export function centsText(micros: bigint): string {
  const isNegative = micros < 0n;
  const cents = ((isNegative ? -micros : micros) + scale / 200n) / (scale / 100n);
  return `${isNegative ? '-' : ''}${cents / 100n}.${String(cents % 100n).padStart(2, '0')}`;
}

export function microsFromText(text: string): bigint | null {
  const match = /^(\d{1,9})(?:\.(\d{1,6}))?$/.exec(text);
  if (!match) return null;
  return BigInt(match[1] ?? '0') * scale + BigInt((match[2] ?? '').padEnd(6, '0'));
}

export function spread(code: QuotedCode, mid: bigint): { bid: bigint; ask: bigint } {
  const half = (mid * figures[code].halfSpreadPpb) / partsPerBillion;
  return { bid: mid - half, ask: mid + half };
}

export function raiseByHundredths(mid: bigint, hundredthsOfPercent: bigint): bigint {
  return (mid * (10_000n + hundredthsOfPercent)) / 10_000n;
}

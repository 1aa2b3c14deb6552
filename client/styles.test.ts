import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

/**
 * Contrast of the colour tokens as WCAG 2.2 defines it (relative luminance and contrast ratio, W3C Recommendation,
 * "Definitions"): 4.5:1 for text (1.4.3), 3:1 for what must be seen of controls and drawings (1.4.11).
 */
const css = readFileSync(new URL('./styles.css', import.meta.url), 'utf8');

type Theme = 'light' | 'dark';
type Tokens = Record<string, Record<Theme, string>>;

function readTokens(): Tokens {
  const found = [...css.matchAll(/--([\w-]+): light-dark\((#[0-9a-f]{6}), (#[0-9a-f]{6})\);/g)];
  return Object.fromEntries(found.map(([, name, light, dark]) => [name, { light, dark }])) as Tokens;
}

const tokens = readTokens();

function luminance(hex: string): number {
  const [r = 0, g = 0, b = 0] = [1, 3, 5].map((start) => {
    const channel = parseInt(hex.slice(start, start + 2), 16) / 255;
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

function contrast(one: string, other: string): number {
  const [dark = 0, light = 0] = [luminance(one), luminance(other)].sort((a, b) => a - b);
  return (light + 0.05) / (dark + 0.05);
}

function token(name: string, theme: Theme): string {
  const value = tokens[name]?.[theme];
  if (!value) throw new Error(`styles.css has no token --${name}`);
  return value;
}

const grounds = ['paper', 'sheet'];
const text: [string, string][] = [
  ...grounds.flatMap((ground) =>
    ['ink', 'ink-2', 'verdigris', 'litharge', 'lapis'].map((ink): [string, string] => [ink, ground]),
  ),
  ['ink', 'wash'],
  ['ink-2', 'wash'],
  ['verdigris', 'wash'],
  ['sheet', 'verdigris'],
  ['sheet', 'litharge'],
  ['paper', 'ink'],
];
const seen: [string, string][] = grounds.flatMap((ground) =>
  ['line', 'verdigris', 'litharge', 'lapis', 'ink'].map((mark): [string, string] => [mark, ground]),
);
const themes: Theme[] = ['light', 'dark'];

describe('colour tokens', () => {
  it('measures black on white as 21:1 and a colour on itself as 1:1', () => {
    expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 6);
    expect(contrast('#17685c', '#17685c')).toBeCloseTo(1, 6);
  });

  it('reads every token from the style sheet', () => {
    expect(Object.keys(tokens).sort()).toEqual(
      ['ink', 'ink-2', 'lapis', 'line', 'litharge', 'paper', 'rule', 'sheet', 'verdigris', 'wash'].sort(),
    );
  });

  for (const theme of themes) {
    it.each(text)(`sets %s on %s readably (${theme})`, (ink, ground) => {
      expect(contrast(token(ink, theme), token(ground, theme))).toBeGreaterThanOrEqual(4.5);
    });
    it.each(seen)(`draws %s on %s visibly (${theme})`, (mark, ground) => {
      expect(contrast(token(mark, theme), token(ground, theme))).toBeGreaterThanOrEqual(3);
    });
  }
});

import { describe, expect, it } from 'vitest';
import { paths, safeNext } from './paths.ts';

describe('paths', () => {
  it('escapes what stands in an address', () => {
    expect(paths.lot('S-2K7F')).toBe('/lots/S-2K7F');
    expect(paths.lot('a/b?c')).toBe('/lots/a%2Fb%3Fc');
    expect(paths.signIn('/deals/D-1?x=1')).toBe('/sign-in?next=%2Fdeals%2FD-1%3Fx%3D1');
  });

  it.each([
    'https://elsewhere.example',
    '//elsewhere.example',
    '/\\elsewhere.example',
    'javascript:x',
    '/a\\b',
    '/\tb',
  ])('does not follow %j after signing in', (next) => expect(safeNext(next)).toBe('/'));

  it('returns to an own address', () => {
    expect(safeNext('/lots?metal=Au')).toBe('/lots?metal=Au');
    expect(safeNext(null)).toBe('/');
  });
});

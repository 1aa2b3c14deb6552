import { render, screen } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import type { MassEntry } from '#shared/mass.ts';
import { ReaderContext, type Reader } from '../../lib/reader-context.ts';
import { Mass } from './mass.tsx';

function shown(entry: MassEntry, weightUnit: Reader['weightUnit']): string {
  render(
    <ReaderContext value={{ timeZone: 'UTC', weightUnit }}>
      <p data-testid="mass">
        <Mass entry={entry} others />
      </p>
    </ReaderContext>,
  );
  return (screen.getByTestId('mass').textContent ?? '').replace(/\u202f/g, ' ');
}

// 1 oz t = 31.1034768 g = 20 dwt = 480 gr, exactly (NIST Handbook 44, Appendix C).
describe('Mass', () => {
  it('tells the entered figure as it was typed and the other units beside it', () => {
    expect(shown({ value: '31.1034768', unit: 'g' }, 'g')).toBe(
      '31.1034768 g1.000000 oz t20.0000 dwt480.00 gr',
    );
  });

  it('puts the reader’s own unit first', () => {
    expect(shown({ value: '2', unit: 'ozt' }, 'dwt')).toMatch(/^40\.0000 dwt/);
  });
});

import { render, screen } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { ReaderContext } from '../../lib/reader-context.ts';
import { MeltRule } from './melt-rule.tsx';

const quote = { at: '2026-12-01T14:02:00Z' };
const band = { low: '99.96', high: '100.04' };

describe('MeltRule', () => {
  it('tells in words all that it draws', () => {
    render(
      <MeltRule
        band={band}
        quote={quote}
        marks={[
          { kind: 'price', percent: '98.20' },
          { kind: 'limit', percent: '98.60' },
        ]}
      />,
    );
    const rule = screen.getByRole('img');
    expect(rule.getAttribute('aria-label')?.replace(/\u202f/g, ' ')).toBe(
      'Melt rule: price 98.20 % of melt; your limit 98.60 % of melt; 95 % range 99.96 to 100.04 % of melt.',
    );
    expect(rule).toHaveTextContent('price 98.20 %');
    expect(rule).toHaveTextContent('your limit 98.60 %');
  });

  it('names the quote in the reader’s zone', () => {
    render(
      <ReaderContext value={{ timeZone: 'Asia/Tokyo', weightUnit: 'g' }}>
        <MeltRule band={null} quote={quote} marks={[]} />
      </ReaderContext>,
    );
    expect(screen.getByText(/at the quote of 23:02 GMT\+9/)).toBeInTheDocument();
  });

  it('stands empty and says why when there is no fresh quote', () => {
    render(<MeltRule band={band} quote={null} marks={[{ kind: 'price', percent: '98.20' }]} />);
    const rule = screen.getByRole('img', { name: 'Melt rule, empty: there is no fresh quote.' });
    expect(rule).not.toHaveTextContent('98.20');
    expect(screen.getByText(/no fresh quote: what the metal is worth now is not known/)).toBeInTheDocument();
  });

  it('points to a price that lies off the rule and still tells it exactly', () => {
    render(<MeltRule band={null} quote={quote} marks={[{ kind: 'price', percent: '312.5' }]} />);
    expect(screen.getByRole('img')).toHaveTextContent('→ price 312.5 %');
  });

  it('has its key in words under the small rule of a register row', () => {
    render(<MeltRule size="row" band={band} quote={quote} marks={[{ kind: 'leading', percent: '97.40' }]} />);
    expect(screen.getByText('97.40 %')).toBeInTheDocument();
    expect(screen.getByText(/leading/)).toBeInTheDocument();
  });
});

import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it } from 'vitest';
import type { SettlementSheet } from '#shared/settlement/sheet-types.ts';
import { ReaderContext } from '../../lib/reader-context.ts';
import { SettlementSheetView } from './settlement-sheet-view.tsx';

const sheet: SettlementSheet = {
  engineVersion: '1',
  moment: 'estimated',
  currency: 'USD',
  audience: 'buyer',
  quotes: [
    {
      id: '0193ad1c-77d0-7e0b-9f5a-1c2ba87298d8',
      metal: 'Au',
      usdPerTroyOunce: '4182.40',
      at: '2026-12-01T14:02:00Z',
      source: 'quote service',
    },
  ],
  lines: [
    {
      key: 'gross',
      kind: 'mass',
      label: 'Gross mass',
      quantity: { value: '31.0240', unit: 'g' },
      rate: null,
      amount: null,
      working: [],
    },
    {
      key: 'fine:Au',
      kind: 'metal',
      label: 'Gold, fine',
      quantity: { value: '0.996647', unit: 'oz t' },
      rate: { value: '4182.40', unit: 'US$/oz t' },
      amount: '4168.38',
      working: ['31.0240 g × 999.2 ‰ = 30.9991808 g', '÷ 31.1034768 g/oz t = 0.996647 oz t'],
    },
    {
      key: 'melt',
      kind: 'sum',
      label: 'Melt value',
      quantity: null,
      rate: null,
      amount: '4168.38',
      working: ['Sum of the metal lines'],
    },
    {
      key: 'price',
      kind: 'price',
      label: 'Price agreed',
      quantity: null,
      rate: { value: '98.20', unit: '%' },
      amount: '4093.35',
      working: [],
    },
    {
      key: 'shipping',
      kind: 'charge',
      label: 'Insured parcel',
      quantity: null,
      rate: null,
      amount: '28.00',
      working: [],
    },
    {
      key: 'total',
      kind: 'total',
      label: 'You pay into escrow',
      quantity: null,
      rate: null,
      amount: '4121.35',
      working: [],
    },
  ],
  fine: [{ metal: 'Au', grams: '30.999181', troyOunces: '0.996647' }],
  melt: {
    value: '4168.38',
    low: '4166.71',
    high: '4170.05',
    expanded: '1.67',
    expandedPercent: '0.04',
    shares: [],
  },
  price: '4093.35',
  percentOfMelt: '98.20',
  shipping: '28.00',
  total: '4121.35',
  assumed: [{ field: '/readability', value: '0.0001 g', reason: 'One unit of the last digit.' }],
};

function show(given: SettlementSheet = sheet) {
  return render(
    <ReaderContext value={{ timeZone: 'UTC', weightUnit: 'g' }}>
      <SettlementSheetView sheet={given} />
    </ReaderContext>,
  );
}

describe('SettlementSheetView', () => {
  it('is a table whose lines carry quantity, rate and amount', () => {
    show();
    expect(screen.getAllByRole('columnheader').map((head) => head.textContent)).toEqual([
      'line',
      'quantity',
      'rate',
      'US$',
    ]);
    const gold = screen.getByRole('row', { name: /Gold, fine/ });
    expect(
      within(gold)
        .getAllByRole('cell')
        .map((cell) => cell.textContent?.replace(/\u202f/g, ' ')),
    ).toEqual(['0.996647 oz t', '4,182.40', '4,168.38']);
    expect(screen.getByRole('row', { name: /You pay into escrow/ })).toHaveTextContent('4,121.35');
  });

  it('opens a line to its working, and only offers what there is', async () => {
    show();
    const working = screen.getByText('31.0240 g × 999.2 ‰ = 30.9991808 g');
    expect(working.closest('details')).not.toHaveAttribute('open');
    await userEvent.click(screen.getByText('Gold, fine', { exact: false, selector: 'summary' }));
    expect(working.closest('details')).toHaveAttribute('open');
    expect(screen.getByText('Insured parcel').closest('details')).toBeNull();
  });

  it('opens and closes every working at once, for printing', async () => {
    const { container } = show();
    const open = () => container.querySelectorAll('details[open]').length;
    await userEvent.click(screen.getByRole('button', { name: 'Open every working' }));
    expect(open()).toBe(2);
    await userEvent.click(screen.getByRole('button', { name: 'Close every working' }));
    expect(open()).toBe(0);
  });

  it('names its quote, its range, its price in % of melt and what was assumed', () => {
    show();
    expect(screen.getByText(/Gold at/)).toHaveTextContent(
      'Gold at US$ 4,182.40 per oz t fine, quote of 1 Dec 2026, 14:02 UTC, quote service, no. a87298d8',
    );
    expect(screen.getByText(/95 % range/)).toHaveTextContent(
      '95 % range US$ 4,160 to 4,180 · price at 98.20 % of melt',
    );
    expect(
      screen.getByText('Readability of the balance: 0.0001 g. One unit of the last digit.'),
    ).toBeInTheDocument();
  });

  it('says of an old quote that it was old', () => {
    const reason = 'No fresh quote at agreement: the quote of 2026-12-01, 14:02 UTC was 12 minutes old.';
    show({ ...sheet, assumed: [{ field: '/quotes/Au', value: 'US$ 4,182.40/oz t', reason }] });
    expect(screen.getByText(`Quote: US$ 4,182.40/oz t. ${reason}`)).toBeInTheDocument();
  });

  it('says at which moment it stands', () => {
    show({ ...sheet, moment: 'final' });
    expect(screen.getByRole('heading')).toHaveTextContent('final');
  });
});

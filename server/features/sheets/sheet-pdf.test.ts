import { inflateSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { refinedSheet } from '#shared/settlement/refined-sheet.ts';
import type { RefinedSheetInput } from '#shared/settlement/sheet-types.ts';
import { renderSheetPdf } from './sheet-pdf.ts';

const input: RefinedSheetInput = {
  gross: { value: '31.62', unit: 'g' },
  readability: null,
  contents: [
    {
      metal: 'Au',
      fineness: { value: '916.7', unit: 'permille' },
      uncertainty: null,
      method: 'fire_assay',
      paidFor: true,
    },
    {
      metal: 'Ag',
      fineness: { value: '45', unit: 'permille' },
      uncertainty: null,
      method: 'titration',
      paidFor: true,
    },
  ],
  quotes: [
    {
      id: '1',
      metal: 'Au',
      usdPerTroyOunce: '4182.40',
      at: '2026-12-01T14:02:11.000Z',
      source: 'quote service',
    },
    {
      id: '2',
      metal: 'Ag',
      usdPerTroyOunce: '51.125',
      at: '2026-12-01T14:02:11.000Z',
      source: 'quote service',
    },
  ],
  price: { amount: '3780.00' },
  shipping: { amount: '38.50' },
  commission: { method: 'card', percent: '4', minimum: '2.00' },
  moment: 'final',
  audience: 'seller',
};

const paper = (lotTitle: string, sheet = refinedSheet(input)) =>
  renderSheetPdf({ sheet, dealCode: 'D-2K7F4Q', lotCode: 'S-7HJ2KP', lotTitle, timeZone: 'America/Denver' });

function pagesOf(pdf: Buffer): number {
  return [...pdf.toString('latin1').matchAll(/\/Type \/Page\b/g)].length;
}

/** The drawing operators of all pages, without the fonts. */
function drawingOf(pdf: Buffer): string {
  const source = pdf.toString('latin1');
  return [...source.matchAll(/stream\r?\n([\s\S]*?)\r?\nendstream/g)]
    .map(([, data]) => {
      try {
        return inflateSync(Buffer.from(data!, 'latin1')).toString('latin1');
      } catch {
        return '';
      }
    })
    .filter((text) => / Tf\b/.test(text))
    .join('\n');
}

describe('renderSheetPdf', () => {
  it('is one page for a lot of two metals, with its fonts embedded', async () => {
    const pdf = await paper('Gold button, 31.62 g');
    expect(pdf.subarray(0, 5).toString()).toBe('%PDF-');
    expect(pagesOf(pdf)).toBe(1);
    const source = pdf.toString('latin1');
    expect(source).toContain('DMSans');
    expect(source).toContain('DMMono');
    expect(source).not.toContain('Helvetica');
  });

  it('goes on to another page when the workings are long', async () => {
    const sheet = refinedSheet(input);
    const long = {
      ...sheet,
      lines: sheet.lines.map((line) => ({ ...line, working: Array(9).fill(line.working[0]) })),
    };
    expect(pagesOf(await paper('Gold button', long))).toBeGreaterThan(1);
  });

  it('draws the note on an old quote', async () => {
    const note = {
      field: '/quotes/Au',
      value: 'US$ 4,182.40/oz t',
      reason: 'No fresh quote at agreement: the quote of 2026-12-01, 14:02 UTC was 12 minutes old.',
    };
    const plain = drawingOf(await paper('Gold button'));
    const noted = drawingOf(await paper('Gold button', refinedSheet({ ...input, notes: [note] })));
    expect(noted.length).toBeGreaterThan(plain.length);
  });

  it('draws a title in any script without a fault', async () => {
    expect(drawingOf(await paper('Łódź 金 button 🙂'))).not.toBe('');
  });

  it('draws more for the seller, whose sheet has the commission', async () => {
    const buyer = drawingOf(await paper('Gold button', refinedSheet({ ...input, audience: 'buyer' })));
    const seller = drawingOf(await paper('Gold button'));
    expect(seller.length).toBeGreaterThan(buyer.length);
  });
});

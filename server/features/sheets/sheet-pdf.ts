import { createRequire } from 'node:module';
import { TZDate } from '@date-fns/tz';
import { format } from 'date-fns';
import PDFDocument from 'pdfkit';
import { METAL_NAMES } from '#shared/metals.ts';
import { shortQuoteNumber } from '#shared/quote-number.ts';
import type { SettlementSheet, SheetLine } from '#shared/settlement/sheet-types.ts';

export type SheetPdfInput = {
  sheet: SettlementSheet;
  dealCode: string;
  lotCode: string;
  lotTitle: string;
  /** The reader's zone; it is named beside every moment. */
  timeZone: string;
};

type Doc = PDFKit.PDFDocument;
type Face = 'text' | 'strong' | 'figures';

const resolve = createRequire(import.meta.url).resolve;
const FACES: Readonly<Record<Face, string>> = {
  text: resolve('@fontsource/dm-sans/files/dm-sans-latin-400-normal.woff'),
  strong: resolve('@fontsource/dm-sans/files/dm-sans-latin-600-normal.woff'),
  figures: resolve('@fontsource/dm-mono/files/dm-mono-latin-400-normal.woff'),
};

const INK = '#1c2427';
const QUIET = '#566064';
const RULE = '#d8d1c3';
const LEFT = 56;
const RIGHT = 539;
const FOOT_Y = 775;
const BOTTOM = 750;
/** Right edges of the whole part of each column of figures: what follows the dot stands to the right of it. */
const COLUMNS = { quantity: 268, rate: 392, amount: 518 } as const;
const FIGURE_SIZE = 9.5;

const MOMENTS: Readonly<Record<SettlementSheet['moment'], string>> = {
  estimated: 'Estimated: what would be paid now',
  provisional: 'Provisional: as agreed',
  final: 'Final: settled',
};
const CAUTION =
  'Scruple compared and confirmed the certificate; it did not test the metal. No tax is computed here. Rules on dealing in precious metal, hallmarks, reporting and tax differ: check your local rules; this is not legal advice.';

function grouped(number: string): string {
  const [whole = '0', decimals] = number.replace('-', '').split('.');
  const sign = number.startsWith('-') ? '−' : '';
  const head = whole.replace(/\B(?=(\d{3})+(?!\d))/g, ',');
  return `${sign}${head}${decimals === undefined ? '' : `.${decimals}`}`;
}

/** A rate in money has its cents, and more decimals only where it has more. */
function withCents(number: string): string {
  const [whole = '0', decimals = ''] = number.split('.');
  return `${whole}.${decimals.padEnd(2, '0')}`;
}

function assumedName(field: string): string {
  if (field.startsWith('/quotes/')) return 'Quote:';
  return field.endsWith('/readability') ? 'Assumed readability:' : 'Assumed expanded uncertainty:';
}

function momentText(at: Date | string, timeZone: string): string {
  return `${format(new TZDate(new Date(at).getTime(), timeZone), 'd MMMM yyyy, HH:mm')} (${timeZone})`;
}

/** What the embedded Latin faces can draw; anything else would print as an empty box. */
const UNDRAWN = /[^\u0020-\u007e\u00a0-\u00ff\u2013\u2014\u2018-\u201d\u2026\u2212]/gu;

/** Letters whose stroke is no combining mark, so that decomposing does not find the plain one. */
const PLAIN: Readonly<Record<string, string>> = {
  ł: 'l',
  Ł: 'L',
  đ: 'd',
  Đ: 'D',
  ħ: 'h',
  ı: 'i',
  œ: 'oe',
  Œ: 'OE',
};

/** Letters beyond Latin-1 lose their marks; what has no plain letter becomes a question mark. */
function printable(text: string): string {
  return text
    .replace(/\s*‰/g, ' per mille')
    .replace(UNDRAWN, (sign) => PLAIN[sign] ?? sign.normalize('NFD').replace(/\p{M}/gu, ''))
    .replace(UNDRAWN, '?');
}

function write(doc: Doc, face: Face, size: number, colour: string): Doc {
  return doc.font(face).fontSize(size).fillColor(colour);
}

function rule(doc: Doc, y: number, colour = RULE): void {
  doc.moveTo(LEFT, y).lineTo(RIGHT, y).lineWidth(0.6).strokeColor(colour).stroke();
}

/** Sets a figure with its decimal sign at `dotX`, so that a column stands on its dots whatever the digits. */
function figureAtDot(doc: Doc, number: string, dotX: number, y: number, face: Face = 'figures'): void {
  const text = grouped(number);
  const [whole = ''] = text.split('.');
  write(doc, face, FIGURE_SIZE, INK);
  doc.text(text, dotX - doc.widthOfString(whole), y, { lineBreak: false });
}

function unitAfter(doc: Doc, number: string, unit: string, dotX: number, y: number): void {
  const [, decimals] = number.split('.');
  write(doc, 'figures', FIGURE_SIZE, INK);
  const tail = decimals === undefined ? '' : `.${decimals}`;
  const x = dotX + doc.widthOfString(tail) + 4;
  write(doc, 'text', 8.5, QUIET).text(printable(unit), x, y + 0.8, { lineBreak: false });
}

function header(doc: Doc, input: SheetPdfInput): void {
  const { sheet } = input;
  write(doc, 'strong', 17, INK).text('Settlement sheet', LEFT, 52, { lineBreak: false });
  write(doc, 'text', 9, QUIET).text('Scruple: metal changes hands at its assay', LEFT, 57, {
    width: RIGHT - LEFT,
    align: 'right',
    lineBreak: false,
  });
  write(doc, 'text', 11, INK).text(printable(input.lotTitle), LEFT, 78, { width: RIGHT - LEFT });
  const facts = [
    `Deal ${input.dealCode}`,
    `Lot ${input.lotCode}`,
    sheet.audience === 'seller' ? 'For the seller' : 'For the buyer',
    MOMENTS[sheet.moment],
  ];
  write(doc, 'text', 9, QUIET).text(facts.join('   ·   '), LEFT, doc.y + 4, { width: RIGHT - LEFT });
  doc.y += 14;
}

function columnHeads(doc: Doc): void {
  const y = doc.y;
  const head = (text: string, x: number) =>
    write(doc, 'text', 8.5, QUIET).text(text, x - doc.widthOfString(text), y, { lineBreak: false });
  write(doc, 'text', 8.5, QUIET).text('Line', LEFT, y, { lineBreak: false });
  head('Quantity', COLUMNS.quantity + 30);
  head('Rate', COLUMNS.rate + 30);
  head('US$', RIGHT);
  rule(doc, y + 14, INK);
  doc.y = y + 20;
}

function workingHeight(doc: Doc, line: SheetLine): number {
  write(doc, 'text', 8, QUIET);
  const width = RIGHT - LEFT - 12;
  return line.working.reduce((sum, text) => sum + doc.heightOfString(printable(text), { width }) + 1, 0);
}

function lineRow(doc: Doc, line: SheetLine): void {
  const isTotal = line.kind === 'total' || line.kind === 'sum';
  if (doc.y + 18 + workingHeight(doc, line) > BOTTOM) {
    doc.addPage();
    doc.y = 56;
    columnHeads(doc);
  }
  if (isTotal) rule(doc, doc.y - 3, INK);
  const y = doc.y + 1;
  write(doc, isTotal ? 'strong' : 'text', 10, INK).text(line.label, LEFT, y, { lineBreak: false });
  if (line.quantity !== null) {
    figureAtDot(doc, line.quantity.value, COLUMNS.quantity, y + 0.5);
    unitAfter(doc, line.quantity.value, line.quantity.unit, COLUMNS.quantity, y + 0.5);
  }
  if (line.rate !== null) {
    const rate = line.rate.unit.startsWith('US$') ? withCents(line.rate.value) : line.rate.value;
    figureAtDot(doc, rate, COLUMNS.rate, y + 0.5);
    unitAfter(doc, rate, line.rate.unit, COLUMNS.rate, y + 0.5);
  }
  if (line.amount !== null) figureAtDot(doc, line.amount, COLUMNS.amount, y + 0.5);
  doc.y = y + 15;
  for (const text of line.working) {
    write(doc, 'text', 8, QUIET).text(printable(text), LEFT + 12, doc.y, { width: RIGHT - LEFT - 12 });
    doc.y += 1;
  }
  doc.y += 6;
}

function noteLines({ sheet, timeZone }: SheetPdfInput): string[] {
  const quotes = sheet.quotes.map(({ metal, usdPerTroyOunce, at, source, id }) => {
    const when = at === null ? '' : `, quote of ${momentText(at, timeZone)}`;
    return `${METAL_NAMES[metal]}: US$ ${grouped(withCents(usdPerTroyOunce))} per oz t fine${when}, ${source}${id === null ? '' : `, no. ${shortQuoteNumber(id)}`}.`;
  });
  const { low, high } = sheet.melt;
  return [
    `Melt value with 95 % range: US$ ${grouped(low)} to ${grouped(high)}.`,
    ...quotes,
    ...sheet.assumed.map(({ field, value, reason }) => `${assumedName(field)} ${value}. ${reason}`),
    `Computed by rules version ${sheet.engineVersion}; it recomputes from what is stored, to the cent.`,
  ];
}

function notes(doc: Doc, input: SheetPdfInput): void {
  const lines = [...noteLines(input), CAUTION].map(printable);
  write(doc, 'text', 8.5, QUIET);
  const width = RIGHT - LEFT;
  const height = lines.reduce((sum, text) => sum + doc.heightOfString(text, { width }) + 3, 0);
  if (doc.y + height + 14 > BOTTOM) {
    doc.addPage();
    doc.y = 56;
  }
  rule(doc, doc.y + 2);
  doc.y += 10;
  for (const text of lines) {
    write(doc, 'text', 8.5, QUIET).text(text, LEFT, doc.y, { width });
    doc.y += 3;
  }
}

function footers(doc: Doc, { dealCode, sheet }: SheetPdfInput): void {
  const { start, count } = doc.bufferedPageRange();
  for (let index = 0; index < count; index += 1) {
    doc.switchToPage(start + index);
    const text = `${dealCode}, ${sheet.moment} sheet      Page ${index + 1} of ${count}`;
    write(doc, 'text', 8, QUIET).text(text, LEFT, FOOT_Y, {
      width: RIGHT - LEFT,
      align: 'right',
      lineBreak: false,
    });
  }
}

/** A sheet on A4, with every line's working, so that it can be added up again by hand. */
export async function renderSheetPdf(input: SheetPdfInput): Promise<Buffer> {
  const doc = new PDFDocument({
    size: 'A4',
    margins: { top: 52, left: LEFT, right: 56, bottom: 40 },
    bufferPages: true,
    info: { Title: `Settlement sheet ${input.dealCode}`, Author: 'Scruple', Subject: input.lotTitle },
  });
  const chunks: Buffer[] = [];
  const ended = new Promise<void>((done, fail) => {
    doc.on('data', (chunk: Buffer) => chunks.push(chunk));
    doc.on('end', done);
    doc.on('error', fail);
  });
  for (const [face, file] of Object.entries(FACES)) doc.registerFont(face, file);
  header(doc, input);
  columnHeads(doc);
  for (const line of input.sheet.lines) lineRow(doc, line);
  notes(doc, input);
  footers(doc, input);
  doc.end();
  await ended;
  return Buffer.concat(chunks);
}

import type { LotAnswer, RegisterAnswer, RegisterRow } from '#shared/schemas/lots.ts';
import type { QuoteAnswer, QuotesAnswer } from '#shared/schemas/quotes.ts';
import type { SessionAnswer } from '#shared/schemas/session.ts';
import { refinedSheet } from '#shared/settlement/refined-sheet.ts';

const quotedAt = '2026-12-01T14:02:00.000Z';
const money = (amount: string) => ({ currency: 'USD' as const, amount });

export function buildMember(change: Partial<NonNullable<SessionAnswer['member']>> = {}) {
  return {
    id: '0b7c1a52-57d5-4c39-9a5c-0f0de2f6a001',
    email: 'buyer@bench.example',
    displayName: 'Orla Venn',
    role: 'member' as const,
    region: 'Kestle',
    weightUnit: 'g' as const,
    timeZone: 'UTC',
    suspendedAt: null,
    suspensionReason: null,
    payouts: { state: 'none' as const, requirements: [] },
    can: { sell: false, useDesk: false },
    ...change,
  };
}

export function buildRow(code: string, change: Partial<RegisterRow> = {}): RegisterRow {
  return {
    code,
    title: 'Gold button, cone mould',
    form: 'button',
    region: 'Harrow Vale',
    evidenceGrade: 'certified',
    gross: { value: '31.0240', unit: 'g', grams: '31.024' },
    mainMetal: 'Au',
    finenessPermille: '999.2',
    uncertaintyPermille: '0.4',
    fineGrams: '30.999181',
    fineTroyOunces: '0.996647',
    price: money('4093.35'),
    linkedPercent: null,
    priceWait: null,
    settlesOn: 'stated',
    melt: { value: '4168.38', lowPercent: '99.96', highPercent: '100.04' },
    percentOfMelt: '98.20',
    closesAt: '2027-01-05T11:00:00.000Z',
    thumb: null,
    isMine: false,
    ...change,
  };
}

export function buildRegister(rows: RegisterRow[], change: Partial<RegisterAnswer> = {}): RegisterAnswer {
  return {
    rows,
    nextCursor: null,
    count: rows.length,
    isCountCapped: false,
    quoteState: 'fresh',
    quotedAt,
    ...change,
  };
}

export function buildLot(change: Partial<LotAnswer> = {}): LotAnswer {
  const price = change.price ?? money('4093.35');
  const contents = [
    { element: 'Au', value: '999.2', paidFor: true },
    { element: 'Ag', value: '0.5', paidFor: false },
  ] as const;
  const sheet = refinedSheet({
    gross: { value: '31.0240', unit: 'g' },
    readability: { value: '0.0001', unit: 'g' },
    contents: contents.map(({ element, value, paidFor }) => ({
      metal: element,
      fineness: { value, unit: 'permille' },
      uncertainty: { value: '0.4', unit: 'permille' },
      method: 'fire_assay',
      paidFor,
    })),
    quotes: [{ id: '71', metal: 'Au', usdPerTroyOunce: '4182.40', at: quotedAt, source: 'Vale quotes' }],
    price: { amount: price.amount },
    shipping: { amount: '28.00' },
    commission: null,
    moment: 'estimated',
    audience: 'buyer',
  });
  return {
    code: 'S-2K7F0A',
    state: 'open',
    version: 3,
    form: 'button',
    title: 'Gold button, cone mould, single melt',
    description: 'One melt of 14 karat findings, refined twice. Clean surface, no slag.',
    region: 'Harrow Vale',
    isMine: false,
    seller: { region: 'Harrow Vale', completedDeals: 14 },
    gross: { value: '31.0240', unit: 'g', grams: '31.024' },
    readability: { value: '0.0001', unit: 'g' },
    contents: contents.map(({ element, value, paidFor }) => ({
      element,
      fineness: { value, unit: 'permille' },
      finenessPermille: value,
      uncertaintyPermille: '0.4',
      isUncertaintyAssumed: false,
      method: 'fire_assay',
      isPaidFor: paidFor,
    })),
    evidenceGrade: 'certified',
    certificate: {
      laboratoryName: 'Orrin Assay Rooms',
      accreditation: 'VAB 4471',
      number: 'OA-26-01733',
      issuedOn: '2026-11-21',
      sampling: 'laboratory',
      itemMass: { value: '31.024', unit: 'g' },
      itemMark: 'HV 12',
      results: [
        { element: 'Au', finenessPermille: '999.2', uncertaintyPermille: '0.4', method: 'fire_assay' },
      ],
      state: 'verified',
      deskNote: 'Compared and confirmed by the desk; the metal was not tested by Scruple.',
      decidedAt: '2026-11-25T10:00:00.000Z',
      documentUrl: null,
    },
    pricingBasis: 'outright',
    price,
    linkedPercent: null,
    floorPercent: null,
    priceWait: null,
    priceFix: null,
    shipping: money('28.00'),
    destinations: ['US', 'CA'],
    closesAt: '2027-01-05T11:00:00.000Z',
    openedAt: '2026-11-25T10:00:00.000Z',
    photos: [],
    sheet,
    sellerSheet: null,
    nets: [],
    quoteState: 'fresh',
    stateReason: null,
    history: [{ at: '2026-11-25T10:00:00.000Z', act: 'opened', who: 'Assay desk', note: null }],
    dealCode: null,
    draft: null,
    can: {
      edit: false,
      submit: false,
      redraft: false,
      changePrice: false,
      withdraw: false,
      pause: false,
      reopen: false,
      copy: false,
      buy: true,
      fixPrice: false,
      giveUpFix: false,
      pull: false,
    },
    ...change,
  };
}

export function buildQuote(metal: QuoteAnswer['metal'], usdPerTroyOunce: string): QuoteAnswer {
  return {
    id: metal,
    metal,
    usdPerTroyOunce,
    at: quotedAt,
    acceptedAt: quotedAt,
    source: 'Vale quotes',
    ageSeconds: 40,
    isFresh: true,
    isQuarantined: false,
  };
}

export function buildQuotes(change: Partial<QuotesAnswer> = {}): QuotesAnswer {
  return {
    now: '2026-12-01T14:02:40.000Z',
    state: 'fresh',
    marketUntil: null,
    staleAfterSeconds: 300,
    quotes: [
      buildQuote('Au', '4182.40'),
      buildQuote('Ag', '50.12'),
      buildQuote('Pt', '1611.00'),
      buildQuote('Pd', '1402.50'),
    ],
    ...change,
  };
}

import type { DealAnswer } from '#shared/schemas/deals.ts';
import type { MemberAnswer } from '#shared/schemas/session.ts';
import { refinedSheet } from '#shared/settlement/refined-sheet.ts';
import type { RefinedSheetInput, SettlementSheet } from '#shared/settlement/sheet-types.ts';

const sheetInput: RefinedSheetInput = {
  gross: { value: '31.024', unit: 'g' },
  readability: { value: '0.001', unit: 'g' },
  contents: [
    {
      metal: 'Au',
      fineness: { value: '999.2', unit: 'permille' },
      uncertainty: { value: '0.4', unit: 'permille' },
      method: 'fire_assay',
      paidFor: true,
    },
  ],
  quotes: [
    { id: '7', metal: 'Au', usdPerTroyOunce: '4182.40', at: '2026-12-01T14:02:00.000Z', source: 'fake' },
  ],
  price: { amount: '4093.35' },
  shipping: { amount: '28.00' },
  commission: null,
  moment: 'provisional',
  audience: 'buyer',
};

export function sampleSheet(changes: Partial<RefinedSheetInput> = {}): SettlementSheet {
  return refinedSheet({ ...sheetInput, ...changes });
}

const usd = (amount: string) => ({ currency: 'USD' as const, amount });

export const noAbilities: DealAnswer['can'] = {
  pay: false,
  ship: false,
  confirmDelivery: false,
  recordReceipt: false,
  accept: false,
  contest: false,
  rule: false,
  takeUp: false,
  freeze: false,
  unfreeze: false,
};

/** A deal as its buyer sees it just after agreement, with whatever else a test needs. */
export function sampleDeal(changes: Partial<DealAnswer> = {}): DealAnswer {
  return {
    code: 'D-81QX2A',
    state: 'agreed',
    side: 'buyer',
    lot: {
      code: 'S-2K7F4B',
      title: 'Gold button, cone mould',
      form: 'button',
      thumb: null,
      region: 'Harrow Vale',
      gross: { value: '31.024', unit: 'g' },
      readability: { value: '0.001', unit: 'g' },
    },
    counterparty: { displayName: 'Ines Marlow', region: 'Harrow Vale' },
    buyer: { displayName: 'Tomas Reeve', region: 'Dunmere' },
    seller: { displayName: 'Ines Marlow', region: 'Harrow Vale' },
    price: usd('4093.35'),
    shipping: usd('28.00'),
    total: usd('4121.35'),
    held: usd('0.00'),
    commission: null,
    paymentMethod: 'card',
    quotes: [],
    provisionalSheet: sampleSheet(),
    finalSheet: null,
    delivery: null,
    parcel: null,
    receipt: null,
    contest: null,
    payout: null,
    refund: null,
    certificateUrl: null,
    endReason: null,
    agreedAt: '2026-12-01T14:05:00.000Z',
    events: [
      {
        at: '2026-12-01T14:05:00.000Z',
        act: 'agreed',
        text: 'Bought at the asked price; quote and terms fixed',
        who: 'buyer',
        held: usd('0.00'),
      },
    ],
    due: {
      who: 'buyer',
      act: 'Pay into escrow',
      at: '2026-12-01T14:40:00.000Z',
      silence: 'If the payment is not started by then, the purchase lapses and the lot is open again.',
    },
    now: '2026-12-01T14:05:00.000Z',
    can: { ...noAbilities, pay: true },
    isFrozen: false,
    ...changes,
  };
}

export function sampleMember(changes: Partial<MemberAnswer> = {}): MemberAnswer {
  return {
    id: '5d2b5d0e-7a55-4c55-9a53-5a9dd0f7a001',
    email: 'tomas@reeve.example',
    displayName: 'Tomas Reeve',
    role: 'member',
    region: 'Dunmere',
    weightUnit: 'g',
    timeZone: 'UTC',
    suspendedAt: null,
    suspensionReason: null,
    payouts: { state: 'none', requirements: [] },
    can: { sell: false, useDesk: false },
    ...changes,
  };
}

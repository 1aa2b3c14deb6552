import { HOLDING_DEAL_STATES, isDealEnded } from '#shared/deal-states.ts';
import { dec, plain } from '#shared/decimal.ts';
import { minorToAmount } from '#shared/money.ts';
import type { MoneyAnswer } from '#shared/schemas/common.ts';
import type { ContestKind, DealAnswer, DealRow, DealsAnswer } from '#shared/schemas/deals.ts';
import type { DeskDealsAnswer } from '#shared/schemas/desk.ts';
import { NotFoundError } from '#server/app-error.ts';
import { compareWithLot } from '#server/features/receipts/compare-with-lot.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { CONTEST_REASON_LABELS } from './contest-reasons.ts';
import { ruleByFrom } from './deadlines.ts';
import { dueOf } from './deal-due.ts';
import { eventText } from './deal-event-text.ts';
import { netMinorOf } from './deal-mails.ts';
import { sheetFor } from './deal-sheets.ts';
import { canDo, isOwnCase, sideOf, type DealSide } from './deal-policy.ts';
import type { DealListEntry, DealView } from './deal-queries.ts';

type Who = Pick<Actor, 'id' | 'role'>;

const usd = (minor: bigint): MoneyAnswer => ({ currency: 'USD', amount: minorToAmount(minor) });
const iso = (moment: Date | null | undefined): string | null => moment?.toISOString() ?? null;
const thumbUrl = (photoId: string | null): string | null =>
  photoId === null ? null : `/api/v1/photos/${photoId}/240`;

function presentCommission(deal: Deal, side: DealSide): DealAnswer['commission'] {
  if (side === 'buyer') return null;
  return {
    percent: plain(dec(deal.commissionPercent)),
    minimum: usd(deal.commissionMinimumMinor),
    amount: usd(deal.commissionMinor),
    net: usd(netMinorOf(deal)),
  };
}

/** The buyer's own address; the seller needs it from funding on, and the desk to rule. */
function presentDelivery(deal: Deal, side: DealSide): DealAnswer['delivery'] {
  if (side === 'seller' && deal.fundedAt === null) return null;
  return {
    name: deal.deliveryName,
    line1: deal.deliveryLine1,
    line2: deal.deliveryLine2,
    city: deal.deliveryCity,
    postcode: deal.deliveryPostcode,
    region: deal.deliveryRegion,
    country: deal.deliveryCountry,
    phone: deal.deliveryPhone,
  };
}

function presentParcel(deal: Deal): DealAnswer['parcel'] {
  const parcel = deal.parcel ?? null;
  if (parcel === null) return null;
  return {
    carrier: parcel.carrier,
    trackingNumber: parcel.trackingNumber,
    insured: usd(parcel.insuredMinor),
    status: parcel.trackerStatus,
    deliveredAt: iso(parcel.deliveredAt),
    isSigned: parcel.isSigned,
    signedBy: parcel.signedBy,
  };
}

function presentReceipt(deal: DealView['deal']): DealAnswer['receipt'] {
  const receipt = deal.receipt ?? null;
  if (receipt === null) return null;
  const mass = { value: receipt.massValue, unit: receipt.massUnit };
  const photo = (size: number) =>
    receipt.photoFileId === null ? null : `/api/v1/deals/${deal.code}/receipt-photo/${size}`;
  return {
    mass,
    ...compareWithLot(deal.lot, mass),
    at: receipt.recordedAt.toISOString(),
    photoUrl: photo(2000),
    photoThumb: photo(240),
  };
}

function presentOutcome(deal: Deal): Pick<DealAnswer, 'payout' | 'refund' | 'contest' | 'endReason'> {
  const { contestedAt } = deal;
  const payout = deal.payout ?? null;
  const refund = deal.refund ?? null;
  return {
    payout:
      payout === null
        ? null
        : {
            state: payout.state,
            amount: usd(payout.amountMinor),
            failureCode: payout.failureCode,
            paidAt: iso(payout.paidAt),
          },
    refund: refund === null ? null : { state: refund.state, amount: usd(refund.amountMinor) },
    contest:
      contestedAt === null
        ? null
        : {
            reason: deal.contestReason as ContestKind,
            note: deal.contestNote ?? '',
            at: contestedAt.toISOString(),
          },
    endReason: deal.endReason,
  };
}

function presentCan(actor: Who, deal: Deal, now: Date): DealAnswer['can'] {
  const can = (action: Parameters<typeof canDo>[1]) => canDo(actor, action, deal, now);
  return {
    pay: can('pay'),
    ship: can('ship'),
    confirmDelivery: can('confirmDelivery'),
    recordReceipt: can('recordReceipt'),
    accept: can('accept'),
    contest: can('contest'),
    rule: can('rule'),
    takeUp: can('takeUp'),
    freeze: can('freeze'),
    unfreeze: can('unfreeze'),
  };
}

function presentLot({ deal, thumbPhotoId }: DealListEntry): DealAnswer['lot'] {
  const { lot } = deal;
  return {
    code: lot.code,
    title: lot.title ?? '',
    form: lot.form ?? '',
    thumb: thumbUrl(thumbPhotoId),
    region: lot.region,
    gross: { value: lot.grossValue ?? '', unit: lot.grossUnit ?? '' },
    readability:
      lot.readabilityValue === null || lot.readabilityUnit === null
        ? null
        : { value: lot.readabilityValue, unit: lot.readabilityUnit },
  };
}

function presentParty({ displayName, region }: DealView['deal']['buyer']): DealAnswer['counterparty'] {
  return { displayName, region };
}

/** The document names the seller's address: the buyer gets it once his money is held, and no more once it came back. */
function certificateUrl(view: DealView, side: DealSide): string | null {
  if (view.certificateId === null) return null;
  const { fundedAt, state } = view.deal;
  if (side === 'buyer' && (fundedAt === null || isDealEnded(state))) return null;
  return `/api/v1/certificates/${view.certificateId}/document`;
}

/**
 * A deal as one of its sides, or the desk, may see it. The commission is for seller and desk, the address for the seller
 * and the certificate's document for the buyer only from funding on. Throws `not-found` for everybody else.
 */
export function presentDeal(view: DealView, actor: Who, now: Date): DealAnswer {
  const { deal } = view;
  const side = sideOf(actor, deal);
  if (side === null) throw new NotFoundError();
  const provisionalSheet = sheetFor(side, view.provisional);
  return {
    code: deal.code,
    state: deal.state,
    side,
    lot: presentLot(view),
    counterparty: presentParty(side === 'buyer' ? deal.seller : deal.buyer),
    buyer: presentParty(deal.buyer),
    seller: presentParty(deal.seller),
    price: usd(deal.priceMinor),
    shipping: usd(deal.shippingMinor),
    total: usd(deal.totalMinor),
    held: usd(view.heldMinor),
    commission: presentCommission(deal, side),
    paymentMethod: deal.paymentMethod,
    quotes: provisionalSheet.quotes.map(({ metal, usdPerTroyOunce, at, source }) => ({
      metal,
      usdPerTroyOunce,
      at,
      source,
    })),
    provisionalSheet,
    finalSheet: view.final === null ? null : sheetFor(side, view.final),
    delivery: presentDelivery(deal, side),
    parcel: presentParcel(deal),
    receipt: presentReceipt(deal),
    ...presentOutcome(deal),
    certificateUrl: certificateUrl(view, side),
    agreedAt: deal.agreedAt.toISOString(),
    events: view.events.map((event) => ({
      at: event.at.toISOString(),
      act: event.act,
      text: eventText(event),
      who: event.actorKind,
      held: usd(event.heldMinor),
    })),
    due: dueOf(deal, now),
    now: now.toISOString(),
    can: presentCan(actor, deal, now),
    isFrozen: deal.frozenAt !== null,
  };
}

function presentRow(entry: DealListEntry, actor: Who, now: Date): DealRow {
  const { deal } = entry;
  const side = actor.id === deal.buyerId ? 'buyer' : 'seller';
  const due = dueOf(deal, now);
  return {
    code: deal.code,
    state: deal.state,
    side,
    lotTitle: deal.lot.title ?? '',
    form: deal.lot.form ?? '',
    thumb: thumbUrl(entry.thumbPhotoId),
    total: usd(deal.totalMinor),
    due,
    isMyTurn: due?.who === side && deal.frozenAt === null,
    closedAt: isClosed(entry) ? iso(deal.endedAt ?? deal.paidOutAt) : null,
    updatedAt: deal.updatedAt.toISOString(),
  };
}

function isClosed({ deal }: DealListEntry): boolean {
  const isRunning =
    HOLDING_DEAL_STATES.includes(deal.state) || deal.state === 'agreed' || deal.state === 'settled';
  return !isRunning && (isDealEnded(deal.state) || deal.state === 'paid_out');
}

/** *Where I stand*: what waits for me, what runs, what is over. */
export function presentDeals(entries: readonly DealListEntry[], actor: Who, now: Date): DealsAnswer {
  const rows = entries.map((entry) => ({ row: presentRow(entry, actor, now), isClosed: isClosed(entry) }));
  const pick = (test: (item: (typeof rows)[number]) => boolean) => rows.filter(test).map(({ row }) => row);
  return {
    toDo: pick((item) => !item.isClosed && item.row.isMyTurn),
    running: pick((item) => !item.isClosed && !item.row.isMyTurn),
    closed: pick((item) => item.isClosed),
    now: now.toISOString(),
  };
}

/** What waits for a ruling, and what the desk may take up because the buyer has let his time pass. */
export function presentDeskDeals(
  { contested: deals, overdue }: { contested: DealView['deal'][]; overdue: DealView['deal'][] },
  actor: Who,
): DeskDealsAnswer {
  return {
    overdue: overdue.map((deal) => ({
      code: deal.code,
      lotTitle: deal.lot.title ?? '',
      deliveredAt: (deal.deliveredAt ?? deal.updatedAt).toISOString(),
      inspectBy: (deal.inspectBy ?? deal.updatedAt).toISOString(),
      total: minorToAmount(deal.totalMinor),
      isOwn: isOwnCase(actor, deal),
    })),
    contested: deals.map((deal) => ({
      code: deal.code,
      lotTitle: deal.lot.title ?? '',
      reason: CONTEST_REASON_LABELS[deal.contestReason as ContestKind] ?? '',
      contestedAt: (deal.contestedAt ?? deal.updatedAt).toISOString(),
      decideBy: ruleByFrom(deal.contestedAt ?? deal.updatedAt).toISOString(),
      total: minorToAmount(deal.totalMinor),
      isOwn: isOwnCase(actor, deal),
    })),
  };
}

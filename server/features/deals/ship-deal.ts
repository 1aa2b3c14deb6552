import { UniqueConstraintError } from 'sequelize';
import { MeasureError } from '#shared/domain-error.ts';
import { fromAmount, groupThousands, minorToAmount } from '#shared/money.ts';
import type { ShipRequest } from '#shared/schemas/deals.ts';
import { ConflictError, InvalidError } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { enqueueProviderTask } from '#server/features/provider-tasks/enqueue-provider-task.ts';
import type { Deal } from '#server/models/deal.ts';
import { Parcel } from '#server/models/parcel.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { arriveByFrom } from './deadlines.ts';
import { mailParcelShipped } from './deal-mails.ts';
import { moveDeal } from './move-deal.ts';
import { assertNotFrozen, assertState, readDealFor } from './read-own-deal.ts';

function readInsured(text: string, priceMinor: bigint): bigint {
  const pointer = '/insuredValue';
  let minor: bigint;
  try {
    ({ minor } = fromAmount(text, pointer));
  } catch (error) {
    if (!(error instanceof MeasureError)) throw error;
    throw new InvalidError([{ pointer, code: error.code, message: error.message }]);
  }
  if (minor >= priceMinor) return minor;
  const message = `Insure it for the price of the metal at least: US$ ${groupThousands(minorToAmount(priceMinor))}`;
  throw new InvalidError([{ pointer, code: 'insured-too-low', message }]);
}

async function insertParcel(
  deal: Deal,
  input: ShipRequest,
  insuredMinor: bigint,
  unit: Unit,
): Promise<Parcel> {
  try {
    return await Parcel.create(
      {
        id: newId(),
        dealId: deal.id,
        carrier: input.carrier,
        trackingNumber: input.trackingNumber,
        insuredMinor,
      },
      { transaction: unit.tx },
    );
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    const message = 'This tracking number belongs to another deal';
    throw new InvalidError([{ pointer: '/trackingNumber', code: 'tracking-number-used', message }]);
  }
}

/**
 * The seller hands the parcel to the carrier: insured for the price on the provisional sheet at least. Opens the clock of
 * the arrival and orders, to be done after commit, that the carrier's events are followed.
 *
 * Locks the deal. Throws `not-found`, `forbidden`, `deal-frozen`, `illegal-transition`, `deadline-passed`,
 * `invalid-input` at `/insuredValue` or `/trackingNumber`.
 */
export async function shipDeal(
  input: ShipRequest & { dealId: string },
  unit: Unit,
  actor: Actor,
): Promise<Deal> {
  const deal = await readDealFor('seller', input.dealId, unit, actor);
  assertState(deal, ['funded'], 'Only a deal that is paid into escrow is shipped.');
  assertNotFrozen(deal);
  if (deal.shipBy !== null && deal.shipBy.getTime() <= unit.now.getTime()) {
    throw new ConflictError('deadline-passed', 'The time to ship has passed; do not send it.');
  }
  const insuredMinor = readInsured(input.insuredValue, deal.priceMinor);
  const parcel = await insertParcel(deal, input, insuredMinor, unit);
  const { carrier, trackingNumber } = parcel;
  await moveDeal(
    deal,
    'shipped',
    {
      act: 'shipped',
      actorKind: 'seller',
      actorId: actor.id,
      detail: { carrier, trackingNumber, insured: minorToAmount(insuredMinor) },
      changes: { shippedAt: unit.now, arriveBy: arriveByFrom(unit.now) },
    },
    unit,
  );
  await enqueueProviderTask(
    {
      dealId: deal.id,
      kind: 'register_parcel',
      payload: { parcelId: parcel.id },
      idempotencyKey: `register-parcel:${deal.id}:v1`,
    },
    unit,
  );
  await mailParcelShipped(deal, parcel, unit);
  return deal;
}

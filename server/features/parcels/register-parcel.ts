import { invariant } from '#server/app-error.ts';
import { defineProviderTask } from '#server/features/provider-tasks/provider-task-handler.ts';
import { carrierClient } from '#server/integrations/clients.ts';
import type { ParcelTracker } from '#server/integrations/carrier.ts';
import { Deal } from '#server/models/deal.ts';
import { Parcel } from '#server/models/parcel.ts';

async function readParcel(dealId: string): Promise<{ parcel: Parcel; reference: string }> {
  const parcel = await Parcel.findOne({ where: { dealId } });
  const deal = await Deal.findByPk(dealId, { attributes: ['code'] });
  invariant(parcel !== null && deal !== null, 'a parcel is ordered together with its deal');
  return { parcel, reference: deal.code };
}

/** Tells the carrier to follow a parcel. Asking twice answers the same tracker, so a repeat needs no look-up first. */
export const registerParcelTask = defineProviderTask<ParcelTracker>({
  effect: async (task) => {
    const { parcel, reference } = await readParcel(task.dealId);
    const { carrier, trackingNumber } = parcel;
    return carrierClient().registerTracker({ carrier, trackingNumber, reference });
  },
  finish: async (task, tracker, unit) => {
    const parcel = await Parcel.findOne({ where: { dealId: task.dealId }, transaction: unit.tx });
    invariant(parcel !== null, 'a parcel is never removed');
    await parcel.update({ registeredAt: unit.now }, { transaction: unit.tx });
    return tracker.id;
  },
});

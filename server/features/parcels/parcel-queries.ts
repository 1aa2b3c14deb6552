import { Op } from 'sequelize';
import { Deal } from '#server/models/deal.ts';
import { Parcel } from '#server/models/parcel.ts';

export type FollowedParcel = Pick<Parcel, 'dealId' | 'carrier' | 'trackingNumber'>;

/**
 * Parcels on their way that the carrier knows, the longest unchecked first. Contested ones stay followed, since what the
 * carrier says is evidence for the desk.
 */
export async function findFollowedParcels(limit: number): Promise<FollowedParcel[]> {
  const deals = await Deal.findAll({
    where: { state: { [Op.in]: ['shipped', 'contested'] } },
    attributes: ['id'],
  });
  return Parcel.findAll({
    where: {
      dealId: deals.map(({ id }) => id),
      registeredAt: { [Op.ne]: null },
      trackerStatus: { [Op.notIn]: ['delivered', 'lost', 'returned'] },
    },
    attributes: ['dealId', 'carrier', 'trackingNumber'],
    order: [['checkedAt', 'ASC']],
    limit,
  });
}

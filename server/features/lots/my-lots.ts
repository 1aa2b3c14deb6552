import { percentText } from '#shared/lot-pricing.ts';
import { lotDraft, type MyLotsAnswer } from '#shared/schemas/lots.ts';
import { photoUrl } from '#server/features/photos/photo-answer.ts';
import { moneyAnswer } from '#server/money-answer.ts';
import { Deal } from '#server/models/deal.ts';
import { Lot } from '#server/models/lot.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { firstPhotos } from './lot-queries.ts';

const SHOWN_MAX = 200;

/** A member's own lots in every state, newest change first. */
export async function findMyLots(actor: Actor): Promise<MyLotsAnswer> {
  const lots = await Lot.findAll({
    where: { sellerId: actor.id },
    order: [
      ['updatedAt', 'DESC'],
      ['id', 'DESC'],
    ],
    limit: SHOWN_MAX,
  });
  const ids = lots.map((lot) => lot.id);
  const [photos, deals] = await Promise.all([
    firstPhotos(ids),
    Deal.findAll({ where: { liveLotId: ids }, attributes: ['code', 'liveLotId'] }),
  ]);
  const dealCodes = new Map(deals.map((deal) => [deal.liveLotId, deal.code]));
  return {
    lots: lots.map((lot) => {
      const photoId = photos.get(lot.id);
      const draft = lot.state === 'draft' ? lotDraft.parse(lot.draft) : null;
      return {
        code: lot.code,
        state: lot.state,
        title: (draft === null ? lot.title : draft.title) ?? '',
        form: draft === null ? lot.form : draft.form === '' ? null : draft.form,
        price: draft !== null || lot.priceMinor === null ? null : moneyAnswer(lot.priceMinor),
        linkedPercent: draft !== null || lot.linkedPercent === null ? null : percentText(lot.linkedPercent),
        thumb: photoId === undefined ? null : photoUrl(photoId, 240),
        stateReason: lot.stateReason,
        updatedAt: lot.updatedAt.toISOString(),
        dealCode: dealCodes.get(lot.id) ?? null,
      };
    }),
  };
}

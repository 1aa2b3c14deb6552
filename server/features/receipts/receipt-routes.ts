import type { z } from 'zod';
import { PHOTO_BYTES_MAX } from '#shared/limits.ts';
import { dealAnswer, dealParams, receiptPhotoAnswer, receiptRequest } from '#shared/schemas/deals.ts';
import { NotFoundError } from '#server/app-error.ts';
import { changeDeal } from '#server/features/deals/answer-deal.ts';
import { findDealIds } from '#server/features/deals/deal-queries.ts';
import { readVisibleDeal } from '#server/features/deals/read-own-deal.ts';
import { photoSizeText, sendPhoto } from '#server/features/photos/send-photo.ts';
import { receivedFile, receiveFile } from '#server/middleware/receive-file.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import { defineRoute, type RouteDefinition } from '#server/routing/define-route.ts';
import { recordReceipt } from './record-receipt.ts';
import { uploadReceiptPhoto } from './upload-receipt-photo.ts';

type DealParams = z.infer<typeof dealParams>;
const RECEIPT_PHOTO = '/api/v1/deals/:code/receipt-photo';
const sizeParams = dealParams.extend({ size: photoSizeText });

export const receiptRoutes: RouteDefinition[] = [
  defineRoute<DealParams, unknown, z.infer<typeof receiptRequest>>({
    method: 'post',
    path: '/api/v1/deals/:code/receipt',
    summary: 'The buyer records the received mass',
    access: 'member',
    limit: 'write',
    whileSuspended: true,
    params: dealParams,
    body: receiptRequest,
    answer: dealAnswer,
    handle: async ({ params, body, actor, res }) => {
      res.json(
        await changeDeal(params.code, actor, (dealId, unit) =>
          recordReceipt({ ...body, dealId }, unit, actor),
        ),
      );
    },
  }),
  defineRoute<DealParams>({
    method: 'post',
    path: RECEIPT_PHOTO,
    summary: 'The buyer uploads a photo of the weighing, to be recorded with the received mass',
    access: 'member',
    limit: 'upload',
    whileSuspended: true,
    params: dealParams,
    answer: receiptPhotoAnswer,
    before: [receiveFile(PHOTO_BYTES_MAX, 'photo-too-large')],
    handle: async ({ params, req, actor, res }) => {
      const { id } = await findDealIds(params.code);
      const file = await uploadReceiptPhoto(id, receivedFile(req), actor);
      res.status(201).json({ fileId: file.id });
    },
  }),
  defineRoute<z.infer<typeof sizeParams>>({
    method: 'get',
    path: `${RECEIPT_PHOTO}/:size`,
    summary: 'The buyer’s photo of the weighing in one of its sizes, for both sides and the desk',
    access: 'member',
    limit: 'read',
    params: sizeParams,
    handle: async ({ params, actor, res }) => {
      const { id } = await findDealIds(params.code);
      const { receipt } = await readVisibleDeal(id, actor);
      const fileId = receipt?.photoFileId ?? null;
      const file = fileId === null ? null : await StoredFile.findByPk(fileId);
      if (file === null) throw new NotFoundError();
      await sendPhoto({ storageKey: file.storageKey, size: params.size, isPublic: false }, res);
    },
  }),
];

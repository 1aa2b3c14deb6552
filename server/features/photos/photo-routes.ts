import type { Response } from 'express';
import { z } from 'zod';
import { PHOTO_BYTES_MAX } from '#shared/limits.ts';
import { PUBLIC_LOT_STATES } from '#shared/lot-states.ts';
import {
  lotParams,
  photoAnswer,
  photoCaptionRequest,
  photoOrderRequest,
  photosAnswer,
} from '#shared/schemas/lots.ts';
import { NotFoundError } from '#server/app-error.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { findLotPhotos, findVisibleLot } from '#server/features/lots/lot-queries.ts';
import { lotIdOf } from '#server/features/lots/own-lot.ts';
import { receivedFile, receiveFile } from '#server/middleware/receive-file.ts';
import { LotPhoto } from '#server/models/lot-photo.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import { defineRoute, type Actor, type RouteDefinition } from '#server/routing/define-route.ts';
import { captionPhoto, orderPhotos, removePhoto } from './change-photos.ts';
import { photoAnswerOf } from './photo-answer.ts';
import { removeFiles } from './remove-files.ts';
import { photoSizeText, sendPhoto } from './send-photo.ts';
import { uploadPhoto } from './upload-photo.ts';

const PHOTOS = '/api/v1/lots/:code/photos';
const photoParams = lotParams.extend({ id: z.uuid() });
const sizeParams = z.object({ id: z.uuid(), size: photoSizeText });

async function answerPhotos(lotId: string, res: Response): Promise<void> {
  res.json({ photos: (await findLotPhotos(lotId)).map(photoAnswerOf) });
}

async function sendLotPhoto(
  { id, size }: z.infer<typeof sizeParams>,
  viewer: Actor | null,
  res: Response,
): Promise<void> {
  const photo = await LotPhoto.findByPk(id, { include: [{ model: StoredFile, as: 'file' }] });
  if (photo === null || photo.file === undefined) throw new NotFoundError();
  const { lot } = await findVisibleLot({ id: photo.lotId }, viewer);
  const isPublic = PUBLIC_LOT_STATES.includes(lot.state);
  await sendPhoto({ storageKey: photo.file.storageKey, size, isPublic }, res);
}

const writeRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'post',
    path: PHOTOS,
    summary: 'Adds one photo to a draft; encoded anew in three sizes, without metadata',
    access: 'member',
    limit: 'upload',
    params: lotParams,
    answer: photoAnswer,
    before: [receiveFile(PHOTO_BYTES_MAX, 'photo-too-large')],
    handle: async ({ params, req, res, actor }) => {
      const lotId = await lotIdOf(params.code);
      const photo = await uploadPhoto(lotId, receivedFile(req), actor);
      res.status(201).json(photoAnswerOf(photo));
    },
  }),
  // Before the routes with an id in the same place.
  defineRoute({
    method: 'put',
    path: `${PHOTOS}/order`,
    summary: 'Puts the photos of a draft in order',
    access: 'member',
    limit: 'write',
    params: lotParams,
    body: photoOrderRequest,
    answer: photosAnswer,
    handle: async ({ params, body, res, actor }) => {
      const lotId = await lotIdOf(params.code);
      await withTransaction({ lots: [lotId] }, (unit) => orderPhotos({ lotId, ...body }, unit, actor));
      await answerPhotos(lotId, res);
    },
  }),
  defineRoute({
    method: 'put',
    path: `${PHOTOS}/:id/caption`,
    summary: 'Writes the caption of a photo',
    access: 'member',
    limit: 'write',
    params: photoParams,
    body: photoCaptionRequest,
    answer: photosAnswer,
    handle: async ({ params, body, res, actor }) => {
      const lotId = await lotIdOf(params.code);
      await withTransaction({ lots: [lotId] }, (unit) =>
        captionPhoto({ lotId, photoId: params.id, ...body }, unit, actor),
      );
      await answerPhotos(lotId, res);
    },
  }),
  defineRoute({
    method: 'delete',
    path: `${PHOTOS}/:id`,
    summary: 'Removes a photo from a draft, row and files',
    access: 'member',
    limit: 'write',
    params: photoParams,
    answer: photosAnswer,
    handle: async ({ params, res, actor }) => {
      const lotId = await lotIdOf(params.code);
      const files = await withTransaction({ lots: [lotId] }, (unit) =>
        removePhoto({ lotId, photoId: params.id }, unit, actor),
      );
      await removeFiles(files);
      await answerPhotos(lotId, res);
    },
  }),
];

export const photoRoutes: RouteDefinition[] = [
  ...writeRoutes,
  defineRoute({
    method: 'get',
    path: '/api/v1/photos/:id/:size',
    summary: 'A photo in one of its sizes, to whoever may see its lot',
    access: 'public',
    limit: 'read',
    params: sizeParams,
    handle: async ({ params, res, viewer }) => {
      await sendLotPhoto(params, viewer, res);
    },
  }),
];

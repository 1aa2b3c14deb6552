import type { Request, RequestHandler } from 'express';
import multer from 'multer';
import type { ErrorCode } from '#shared/error-codes.ts';
import { AppError, InvalidError } from '#server/app-error.ts';

export type ReceivedFile = { name: string; content: Buffer };

const NAME_LENGTH_MAX = 255;

/** A name for people to read: no path, no control or direction signs; never used to open anything. */
export function tidyFileName(name: string): string {
  const last = name.normalize('NFC').split(/[\\/]/).at(-1) ?? '';
  const tidy = last.replace(/[\p{C}"<>|*?:]+/gu, ' ').trim();
  return (tidy === '' ? 'file' : tidy).slice(-NAME_LENGTH_MAX);
}

/**
 * Reads one file of a multipart request into memory, at most `bytesMax` counted bytes; more is refused with `tooLarge`
 * while it is still coming in. One file a request, so that the sender can show the progress of each.
 */
export function receiveFile(bytesMax: number, tooLarge: ErrorCode): RequestHandler {
  const upload = multer({
    storage: multer.memoryStorage(),
    defParamCharset: 'utf8',
    limits: { fileSize: bytesMax, files: 1, fields: 4, fieldSize: 4096, parts: 6, headerPairs: 50 },
  }).any();
  return (req, res, next) => {
    upload(req, res, (error: unknown) => {
      if (error instanceof multer.MulterError) {
        next(new AppError(error.code === 'LIMIT_FILE_SIZE' ? tooLarge : 'malformed-request'));
      } else if (error) {
        // The parser's own complaints about a body that is no multipart form carry no class of their own.
        next(new AppError('malformed-request'));
      } else next();
    });
  };
}

/** The file that `receiveFile` read. Throws `invalid-input` when none came. */
export function receivedFile(req: Request): ReceivedFile {
  const file = (req.files as Express.Multer.File[] | undefined)?.[0];
  if (file === undefined) {
    throw new InvalidError([{ pointer: '/file', code: 'file-missing', message: 'Choose a file.' }]);
  }
  return { name: tidyFileName(file.originalname), content: file.buffer };
}

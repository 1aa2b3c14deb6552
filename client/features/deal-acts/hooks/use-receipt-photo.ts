import { useEffect, useState } from 'react';
import { PHOTO_BYTES_MAX } from '#shared/limits.ts';
import { useUpload } from '../../../lib/use-upload.ts';
import { uploadReceiptPhoto } from '../api/upload-receipt-photo.ts';

export type TakenPhoto = { fileId: string; name: string; preview: string };

/** The photo of the weighing: sent as soon as it is chosen, taken back or replaced until the mass is recorded. */
export function useReceiptPhoto(code: string) {
  const [taken, setTaken] = useState<TakenPhoto | null>(null);
  const preview = taken?.preview;
  useEffect(() => () => void (preview && URL.revokeObjectURL(preview)), [preview]);
  const upload = useUpload({
    send: (file, sending) => uploadReceiptPhoto(code, file, sending),
    bytesMax: PHOTO_BYTES_MAX,
    tooLarge: `The photo is too large: at most ${PHOTO_BYTES_MAX / (1024 * 1024)} MB.`,
    onTaken: ({ fileId }, file) => setTaken({ fileId, name: file.name, preview: URL.createObjectURL(file) }),
  });
  return { ...upload, taken, drop: () => setTaken(null) };
}

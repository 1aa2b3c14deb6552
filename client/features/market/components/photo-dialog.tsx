import { useState } from 'react';
import type { PhotoAnswer } from '#shared/schemas/lots.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';
import { cx } from '../../../lib/cx.ts';
import { photoNote, photoText } from './photo-words.ts';

type PhotoDialogProps = {
  photos: PhotoAnswer[];
  at: number;
  onMove: (at: number) => void;
  isOpen: boolean;
  onClose: () => void;
  title: string;
};

/** One picture as large as the window, or in its own size to look around in; arrow keys lead through all of them. */
export function PhotoDialog({ photos, at, onMove, isOpen, onClose, title }: PhotoDialogProps) {
  const [isFull, setFull] = useState(false);
  const photo = photos[at];
  if (!photo) return null;
  const move = (by: number) => {
    setFull(false);
    onMove((at + by + photos.length) % photos.length);
  };
  const onKeyDown = (event: React.KeyboardEvent) => {
    // In full size the arrow keys look around in the picture.
    if (isFull || photos.length < 2) return;
    if (event.key === 'ArrowRight') move(1);
    if (event.key === 'ArrowLeft') move(-1);
  };
  const close = () => {
    setFull(false);
    onClose();
  };
  return (
    <Dialog open={isOpen} onClose={close} title={title} wide>
      <div onKeyDown={onKeyDown}>
        <div
          className={cx('border border-rule', isFull ? 'h-[65vh] overflow-auto' : 'grid place-items-center')}
          tabIndex={isFull ? 0 : undefined}
          role={isFull ? 'region' : undefined}
          aria-label={isFull ? 'Picture in its own size; scroll to look around' : undefined}
        >
          <img
            src={photo.large}
            alt={photoText(photo, title)}
            className={isFull ? 'max-w-none' : 'max-h-[65vh] max-w-full object-contain'}
          />
        </div>
        <p className="mt-2 flex flex-wrap justify-between gap-x-4 text-note text-ink-2" aria-live="polite">
          <span>
            {at + 1} of {photos.length}
            {photo.caption && `: ${photo.caption}`}
          </span>
          <span>{photoNote(photo)}</span>
        </p>
        <div className="mt-3 flex flex-wrap gap-3">
          <Button look="second" aria-pressed={isFull} onClick={() => setFull(!isFull)}>
            {isFull ? 'Fit to the window' : 'In its own size'}
          </Button>
          {photos.length > 1 && (
            <>
              <Button look="quiet" onClick={() => move(-1)}>
                Previous picture
              </Button>
              <Button look="quiet" onClick={() => move(1)}>
                Next picture
              </Button>
            </>
          )}
        </div>
      </div>
    </Dialog>
  );
}

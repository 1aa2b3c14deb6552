import { useState } from 'react';
import { isMetal } from '#shared/metals.ts';
import type { LotAnswer, PhotoAnswer } from '#shared/schemas/lots.ts';
import { SpecimenDrawing } from '../../../components/figures/specimen-drawing.tsx';
import { cx } from '../../../lib/cx.ts';
import { PhotoDialog } from './photo-dialog.tsx';
import { photoNote, photoText } from './photo-words.ts';
import { lotFormOf } from './register-row-parts.tsx';

type PhotoViewerProps = { lot: Pick<LotAnswer, 'photos' | 'form' | 'title' | 'contents'> };

/** The photos of a lot: one large, the others under it, each as large as it is on demand. */
export function PhotoViewer({ lot }: PhotoViewerProps) {
  const [at, setAt] = useState(0);
  const [isLarge, setLarge] = useState(false);
  const { photos } = lot;
  const photo = photos[Math.min(at, photos.length - 1)];
  if (!photo) return <NoPhoto lot={lot} />;
  return (
    <div>
      <figure className="sheet">
        <button
          type="button"
          onClick={() => setLarge(true)}
          className="block w-full cursor-zoom-in bg-sheet p-2"
        >
          <img
            src={photo.medium}
            alt={photoText(photo, lot.title)}
            width={photo.width || undefined}
            height={photo.height || undefined}
            className="mx-auto max-h-120 w-auto max-w-full object-contain"
          />
          <span className="sr-only">Look closer</span>
        </button>
        <figcaption className="flex flex-wrap justify-between gap-x-4 border-t border-rule px-4 py-2 text-note text-ink-2">
          <span>{photo.caption || `Photo ${at + 1} of ${photos.length}`}</span>
          <span>{photoNote(photo)}</span>
        </figcaption>
      </figure>
      {photos.length > 1 && <PhotoStrip photos={photos} at={at} onPick={setAt} title={lot.title} />}
      <PhotoDialog
        photos={photos}
        at={at}
        onMove={setAt}
        isOpen={isLarge}
        onClose={() => setLarge(false)}
        title={lot.title}
      />
    </div>
  );
}

type PhotoStripProps = { photos: PhotoAnswer[]; at: number; onPick: (at: number) => void; title: string };

function PhotoStrip({ photos, at, onPick, title }: PhotoStripProps) {
  return (
    <ul aria-label="All photos" className="mt-2 grid grid-cols-[repeat(auto-fill,minmax(4.5rem,1fr))] gap-2">
      {photos.map((photo, index) => (
        <li key={photo.id}>
          <button
            type="button"
            aria-pressed={index === at}
            onClick={() => onPick(index)}
            className={cx(
              'block w-full rounded-box border bg-sheet p-1',
              index === at ? 'border-ink' : 'border-rule',
            )}
          >
            <img src={photo.thumb} alt={photoText(photo, title)} className="h-16 w-full object-contain" />
          </button>
        </li>
      ))}
    </ul>
  );
}

function NoPhoto({ lot }: PhotoViewerProps) {
  const main = lot.contents.find((content) => content.isPaidFor)?.element ?? 'Au';
  return (
    <figure className="sheet">
      <SpecimenDrawing
        form={lotFormOf(lot.form)}
        metal={isMetal(main) ? main : 'Au'}
        className="mx-auto max-h-96 w-full max-w-md p-6"
      />
      <figcaption className="border-t border-rule px-4 py-2 text-note text-ink-2">
        A drawing of the form; there is no photo of this lot.
      </figcaption>
    </figure>
  );
}

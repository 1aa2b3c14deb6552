import { useState } from 'react';
import type { PhotoAnswer } from '#shared/schemas/lots.ts';
import { Button } from '../../../components/ui/button.tsx';
import { TextInput } from '../../../components/ui/inputs.tsx';

type PhotoTileProps = {
  photo: PhotoAnswer;
  at: number;
  count: number;
  isBusy: boolean;
  onMove: (to: number) => void;
  onRemove: () => void;
  onCaption: (caption: string) => void;
};

const CAPTION_LENGTH_MAX = 200;

/** One photo of the draft with its place and its caption. */
export function PhotoTile({ photo, at, count, isBusy, onMove, onRemove, onCaption }: PhotoTileProps) {
  const [caption, setCaption] = useState(photo.caption);
  const id = `photo-${photo.id}`;
  const name = `photo ${at + 1}`;
  const act = 'min-h-8 py-1 text-note';
  return (
    <li className="sheet flex gap-3 p-3">
      <img
        src={photo.thumb}
        alt={photo.caption || `Photo ${at + 1} of the lot`}
        className="size-24 shrink-0 rounded-box bg-paper object-cover"
      />
      <div className="flex min-w-0 grow flex-col gap-1">
        <label htmlFor={id} className="text-note font-medium">
          Caption of {name}
        </label>
        <TextInput
          id={id}
          value={caption}
          maxLength={CAPTION_LENGTH_MAX}
          onChange={(event) => setCaption(event.target.value)}
          onBlur={() => caption !== photo.caption && onCaption(caption)}
        />
        <div className="flex flex-wrap gap-x-2">
          <Button
            look="quiet"
            className={act}
            aria-label={`Earlier: ${name}`}
            disabled={at === 0}
            busy={isBusy}
            onClick={() => onMove(at - 1)}
          >
            Earlier
          </Button>
          <Button
            look="quiet"
            className={act}
            aria-label={`Later: ${name}`}
            disabled={at === count - 1}
            busy={isBusy}
            onClick={() => onMove(at + 1)}
          >
            Later
          </Button>
          <Button look="quiet" className={act} busy={isBusy} onClick={onRemove}>
            Remove<span className="sr-only"> {name}</span>
          </Button>
        </div>
      </div>
    </li>
  );
}

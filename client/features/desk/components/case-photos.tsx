import type { CaseAnswer } from '#shared/schemas/desk.ts';

/** The lot's photos, each opening in full size: a mark is looked for at full resolution. */
export function CasePhotos({ photos }: { photos: CaseAnswer['lot']['photos'] }) {
  if (photos.length === 0) return <p className="text-ink-2">The lot has no photos.</p>;
  return (
    <ul className="flex flex-wrap gap-3">
      {photos.map((photo, index) => {
        const name = photo.caption || `photo ${index + 1}`;
        return (
          <li key={photo.id}>
            <a href={photo.large} target="_blank" rel="noreferrer" className="block">
              <img
                src={photo.thumb}
                alt={`Open ${photo.isDrawing ? 'the drawing' : 'the photo'} in full size: ${name}`}
                loading="lazy"
                className="sheet size-24 object-contain"
              />
            </a>
          </li>
        );
      })}
    </ul>
  );
}

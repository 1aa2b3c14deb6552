import type { PhotoAnswer } from '#shared/schemas/lots.ts';

/** What stands beside a picture that is not a photograph. */
export function photoNote(photo: PhotoAnswer): string {
  return photo.isDrawing ? 'drawing, demo data' : '';
}

export function photoText(photo: PhotoAnswer, title: string): string {
  const kind = photo.isDrawing ? 'Drawing' : 'Photo';
  return `${kind}: ${photo.caption || title}`;
}

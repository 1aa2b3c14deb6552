import sharp from 'sharp';
import { HATCHES, PAPER, wobble } from './draw-lines.ts';
import { SPECIMEN_VIEWS } from './specimen-views.ts';

const LABEL = '#566064';

function viewOf(caption: string): 'above' | 'side' | 'under' {
  if (caption === 'from the side') return 'side';
  return caption === 'underside' ? 'under' : 'above';
}

/**
 * A line drawing in place of a photo, which says of itself that it is one. Each is one of its own: the desk is told when
 * a picture was seen before.
 */
export async function drawSpecimen(
  form: keyof typeof SPECIMEN_VIEWS,
  caption: string,
  seed: number,
): Promise<Buffer> {
  const draw = SPECIMEN_VIEWS[form][viewOf(caption)];
  const svg = `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 1200 900" width="1200" height="900">
    <defs>${HATCHES}</defs>
    <rect width="1200" height="900" fill="${PAPER}"/>
    <g transform="rotate(${wobble(seed, 3, 1.5)} 600 400)">${draw(seed)}</g>
    <text x="60" y="862" font-family="DejaVu Sans Mono, monospace" font-size="30" fill="${LABEL}">drawing, demo data · ${caption}</text>
  </svg>`;
  return sharp(Buffer.from(svg)).jpeg({ quality: 88 }).toBuffer();
}

import sharp from 'sharp';

const INK = '#1C2427';
const PAPER = '#FFFDF8';
const LABEL = '#566064';

/** A drawing must be one of its own: the desk is told when a picture was seen before. */
type View = { turn: number; seed: number };

const HATCH = `<pattern id="hatch" width="11" height="11" patternUnits="userSpaceOnUse" patternTransform="rotate(38)">
  <line x1="0" y1="0" x2="0" y2="11" stroke="${INK}" stroke-width="1.4" opacity="0.4"/></pattern>`;

function wobble(seed: number, index: number, span: number): number {
  return ((Math.sin(seed * 12.9898 + index * 78.233) * 43758.5453) % 1) * span;
}

function button({ seed }: View): string {
  const tilt = wobble(seed, 1, 12);
  return `<path d="M330 ${640 + tilt} C 330 420, 470 300, 600 300 S 870 420, 870 ${640 - tilt} C 870 760, 330 760, 330 ${640 + tilt} Z"
    fill="${PAPER}" stroke="${INK}" stroke-width="7"/>
  <path d="M330 ${640 + tilt} C 440 560, 760 560, 870 ${640 - tilt} C 870 760, 330 760, 330 ${640 + tilt} Z" fill="url(#hatch)"/>
  <ellipse cx="${560 + tilt * 2}" cy="400" rx="96" ry="38" fill="${PAPER}" stroke="${INK}" stroke-width="4"/>`;
}

function bar({ seed }: View): string {
  const skew = wobble(seed, 2, 26);
  return `<path d="M250 610 L${360 + skew} 390 L${870 + skew} 390 L960 610 L930 740 L285 740 Z" fill="${PAPER}" stroke="${INK}" stroke-width="7"/>
  <path d="M250 610 L960 610 L930 740 L285 740 Z" fill="url(#hatch)"/>
  <path d="M250 610 L960 610" stroke="${INK}" stroke-width="5"/>
  <rect x="${470 + skew}" y="440" width="270" height="104" fill="none" stroke="${INK}" stroke-width="4"/>`;
}

function grain({ seed }: View): string {
  return Array.from({ length: 90 }, (_, index) => {
    const angle = index * 2.39996 + wobble(seed, index, 0.5);
    const distance = 27 * Math.sqrt(index);
    const x = 600 + distance * 1.35 * Math.cos(angle);
    const y = 560 + distance * 0.62 * Math.sin(angle);
    const radius = 24 + wobble(seed, index + 200, 9);
    return `<ellipse cx="${x}" cy="${y}" rx="${radius}" ry="${radius * 0.86}" fill="${PAPER}" stroke="${INK}" stroke-width="4.5"/>
    <ellipse cx="${x + 4}" cy="${y + 5}" rx="${radius * 0.6}" ry="${radius * 0.44}" fill="url(#hatch)"/>`;
  }).join('');
}

const FORMS = { button, bar, grain } as const;

/** A line drawing in place of a photo, which says of itself that it is one. */
export async function drawSpecimen(form: keyof typeof FORMS, caption: string, seed: number): Promise<Buffer> {
  const view = { turn: wobble(seed, 3, 5), seed };
  const svg = `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 1200 900" width="1200" height="900">
    <defs>${HATCH}</defs>
    <rect width="1200" height="900" fill="${PAPER}"/>
    <path d="M150 ${770 + wobble(seed, 4, 20)} H1050" stroke="#D8D1C3" stroke-width="3"/>
    <g transform="rotate(${view.turn} 600 560)">${FORMS[form](view)}</g>
    <text x="60" y="846" font-family="DejaVu Sans Mono, monospace" font-size="30" fill="${LABEL}">drawing, demo data · ${caption}</text>
  </svg>`;
  return sharp(Buffer.from(svg)).jpeg({ quality: 88 }).toBuffer();
}

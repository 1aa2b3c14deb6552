import { blob, drillHole, line, PAPER, shade, smooth, within, wobble } from './draw-lines.ts';

/** Draws one view of a lot into a field of 1200 by 800; the seed makes every piece one of its own. */
type View = (seed: number) => string;
type Views = { above: View; side: View; under: View };

/** Seen from above: the round of the mould with the rings in which it set, its shadowed flank, one drill hole. */
function buttonAbove(seed: number): string {
  const round = { x: 600, y: 405, rough: 0.025, seed };
  const outline = blob({ ...round, rx: 440, ry: 362 });
  const lit = blob({ ...round, x: 545, y: 360, rx: 400, ry: 322, seed: seed + 1 });
  const rings = [0.8, 0.6, 0.4, 0.2].map((share, index) =>
    line(
      blob({
        x: 570 + wobble(seed, index, 18),
        y: 380 + wobble(seed, index + 9, 12),
        rx: 400 * share,
        ry: 320 * share,
        rough: 0.05,
        seed: seed + index + 2,
      }),
      { width: 2.5 },
    ),
  );
  return (
    line(outline, { fill: PAPER, width: 8 }) +
    within('body', outline, shade(`M0 0H1200V800H0Z${lit}`, 'close') + rings.join('')) +
    drillHole(705 + wobble(seed, 5, 60), 300 + wobble(seed, 6, 40), 34)
  );
}

/** From the side: a low dome on its flat, dark where the light does not reach. */
function buttonSide(seed: number): string {
  const top = 190 + wobble(seed, 1, 22);
  const lean = wobble(seed, 2, 40);
  const outline = `M120 640C130 430 ${330 + lean} ${top} ${600 + lean} ${top}S1075 430 1080 640C1070 715 900 745 600 745S130 715 120 640Z`;
  const dark = `M${690 + lean} 0C900 250 960 480 860 800H1200V0Z`;
  const darkest = `M${880 + lean} 0C1010 300 1050 500 985 800H1200V0Z`;
  const foot = 'M120 640C160 705 340 722 600 722S1040 705 1080 640V800H120Z';
  const runs = [0, 1, 2, 3, 4].map((index) => {
    const y = 330 + index * 68;
    const reach = 210 + index * 56;
    return line(
      `M${590 + lean - reach} ${y + 70}C${560 - reach / 2} ${y} ${560 + reach / 3} ${y - 6} ${600 + reach / 2} ${y + 24}`,
      { width: 2.5 },
    );
  });
  return (
    `<path d="M40 748H1160" stroke="#D8D1C3" stroke-width="4"/>` +
    shade('M160 752H1150C1120 778 900 790 620 790S220 776 160 752Z', 'close') +
    line(outline, { fill: PAPER, width: 8 }) +
    within(
      'body',
      outline,
      runs.join('') + shade(dark, 'wide') + shade(darkest, 'close') + shade(foot, 'crossed'),
    ) +
    line(
      `M${410 + lean} ${top + 62}C${490 + lean} ${top + 26} ${600 + lean} ${top + 20} ${690 + lean} ${top + 44}`,
      { width: 3 },
    )
  );
}

/** The underside: flat, with the rim turned up, blow holes and the second drill hole. */
function buttonUnder(seed: number): string {
  const round = { x: 600, y: 405, rough: 0.025, seed };
  const outline = blob({ ...round, rx: 440, ry: 362 });
  const flat = blob({ ...round, rx: 372, ry: 298, rough: 0.035, seed: seed + 3 });
  const pits = Array.from({ length: 16 }, (_, index) => {
    const angle = index * 2.4 + seed;
    const away = 60 + index * 15;
    const [x, y] = [600 + away * Math.cos(angle), 405 + away * 0.78 * Math.sin(angle)];
    return line(blob({ x, y, rx: 13 + wobble(seed, index, 7), ry: 9, rough: 0.15, seed: index, points: 7 }), {
      width: 3,
    });
  });
  const rays = Array.from({ length: 72 }, (_, index) => {
    const angle = (index / 72) * 2 * Math.PI;
    const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
    const inner = 0.93 + wobble(seed, index, 0.03);
    return `M${600 + 440 * cos} ${405 + 362 * sin}L${600 + 440 * inner * cos} ${405 + 362 * inner * sin}`;
  });
  return (
    line(outline, { fill: PAPER, width: 8 }) +
    within('body', outline, shade(`${outline}${flat}`, 'wide') + line(rays.join(''), { width: 2.5 })) +
    line(flat, { fill: PAPER, width: 4 }) +
    within('flat', flat, shade('M0 800L1200 330V800Z', 'wide') + pits.join('')) +
    drillHole(600 + wobble(seed, 5, 90), 405 + wobble(seed, 6, 50), 40)
  );
}

/** From above: the upper face within its four sloping flanks, with the box for the mark. */
function barAbove(seed: number): string {
  const bend = wobble(seed, 2, 14);
  const outline = `M92 ${150 + bend}Q90 118 122 116L1080 ${112 - bend}Q1112 112 1110 146L1114 660Q1112 694 1078 694L124 ${698 + bend}Q92 696 92 662Z`;
  const face = `M190 208Q600 ${190 + bend} 1012 206L1016 604Q600 ${622 + bend} 188 606Z`;
  const edges = `M104 124L190 208M1102 120L1012 206M1106 686L1016 604M100 690L188 606`;
  const rings = [0, 1, 2].map((index) =>
    line(
      `M${270 + index * 60} ${262 + index * 36}Q600 ${236 + index * 40 + bend} ${930 - index * 60} ${262 + index * 36}`,
      { width: 2.5 },
    ),
  );
  return (
    line(outline, { fill: PAPER, width: 8 }) +
    within(
      'body',
      outline,
      shade('M188 606L1016 604L1200 800H0Z', 'crossed') + shade('M1012 206L1016 604L1200 800V0Z', 'close'),
    ) +
    line(face, { fill: PAPER, width: 5 }) +
    line(edges, { width: 4 }) +
    rings.join('') +
    line(`M430 432H${774 + bend}V554H430Z`, { width: 5 }) +
    line(`M462 474H${742 + bend}M462 512H680`, { width: 3 }) +
    drillHole(850 + wobble(seed, 6, 50), 480 + wobble(seed, 7, 40), 30)
  );
}

/** From the side: the long flank on its foot, shrunk a little in the middle of its upper edge. */
function barSide(seed: number): string {
  const sag = 24 + wobble(seed, 3, 12);
  const outline = `M196 300Q600 ${300 + sag * 2} 1004 296L1108 700Q1110 724 1084 724H116Q90 724 94 700Z`;
  const waves = [0, 1, 2, 3].map((index) =>
    line(
      `M${176 - index * 20} ${392 + index * 78}C400 ${420 + index * 74 + wobble(seed, index, 16)} 760 ${372 + index * 80} ${1010 + index * 24} ${398 + index * 76}`,
      { width: 2.5 },
    ),
  );
  return (
    `<path d="M30 727H1170" stroke="#D8D1C3" stroke-width="4"/>` +
    shade('M110 732H1150C1120 770 930 782 640 782S170 770 110 732Z', 'close') +
    line(outline, { fill: PAPER, width: 8 }) +
    within(
      'body',
      outline,
      waves.join('') +
        shade('M0 800V610Q600 560 1200 620V800Z', 'wide') +
        shade('M830 0L930 800H1200V0Z', 'close'),
    ) +
    line(`M196 300L232 ${238 + sag / 2}Q600 ${236 + sag} 968 ${234 + sag / 2}L1004 296`, { width: 5 })
  );
}

/** The underside: the wider face as the mould left it, with its seam and two drill holes. */
function barUnder(seed: number): string {
  const outline = smooth([
    [92, 130],
    [350, 116],
    [850, 114],
    [1108, 128],
    [1116, 260],
    [1116, 550],
    [1108, 682],
    [850, 696],
    [350, 698],
    [92, 684],
    [84, 550],
    [84, 260],
  ]);
  const grit = Array.from({ length: 70 }, (_, index) => {
    const x = 600 + wobble(seed, index + 20, 470);
    const y = 405 + wobble(seed, index + 120, 250);
    return `M${x} ${y}l${9 + wobble(seed, index, 6)} ${5 + wobble(seed, index + 7, 6)}`;
  });
  return (
    line(outline, { fill: PAPER, width: 8 }) +
    within(
      'body',
      outline,
      shade('M0 800L1200 240V800Z', 'wide') +
        shade('M420 800L1200 500V800Z', 'close') +
        line(grit.join(''), { width: 4 }),
    ) +
    line(`M150 ${404 + wobble(seed, 4, 26)}C400 392 800 424 1050 ${398 + wobble(seed, 5, 26)}`, {
      width: 3,
    }) +
    drillHole(300 + wobble(seed, 6, 60), 270 + wobble(seed, 7, 40), 32) +
    drillHole(860 + wobble(seed, 8, 60), 540 + wobble(seed, 9, 40), 32)
  );
}

function pellet(x: number, y: number, radius: number, seed: number): string {
  const outline = blob({ x, y, rx: radius, ry: radius * 0.88, rough: 0.07, seed, points: 8 });
  const shadow = `M${x - radius} ${y + radius}Q${x + radius * 0.5} ${y + radius * 0.6} ${x + radius * 0.75} ${y - radius}H${x + radius * 1.2}V${y + radius * 1.2}Z`;
  return line(outline, { fill: PAPER, width: 4.5 }) + within(`p${seed}`, outline, shade(shadow, 'close'));
}

/** From above: a round dish full of grain. */
function grainAbove(seed: number): string {
  const grains = Array.from({ length: 120 }, (_, index) => {
    const angle = index * 2.39996 + wobble(seed, index, 0.08);
    const away = 31.5 * Math.sqrt(119 - index);
    return pellet(
      600 + away * 1.25 * Math.cos(angle),
      400 + away * Math.sin(angle) * 0.98,
      33 + wobble(seed, index + 200, 9),
      1000 + index,
    );
  });
  const dish = (share: number) =>
    blob({ x: 600, y: 400, rx: 500 * share, ry: 385 * share, rough: 0.004, seed });
  return (
    line(dish(1), { fill: PAPER, width: 8 }) +
    shade(`${dish(1)}${dish(0.93)}`, 'wide') +
    line(dish(0.93), { width: 4 }) +
    grains.join('')
  );
}

/** From the side: a heap, row upon row. */
function grainSide(seed: number): string {
  const rows = [18, 16, 14, 11, 8, 5, 2];
  const grains = rows.flatMap((count, row) =>
    Array.from({ length: count }, (_, index) =>
      pellet(
        600 + (index - (count - 1) / 2) * 57 + wobble(seed, row * 20 + index, 9),
        705 - row * 77 + wobble(seed, row * 20 + index + 300, 13),
        39 + wobble(seed, row * 20 + index + 600, 8),
        2000 + row * 20 + index,
      ),
    ),
  );
  return `<path d="M30 744H1170" stroke="#D8D1C3" stroke-width="4"/>${shade('M60 748H1150C1100 782 900 790 620 790S130 780 60 748Z', 'close')}${grains.reverse().join('')}`;
}

/** Some grains turned over, near: the flat on which each set. */
function grainUnder(seed: number): string {
  const places = [
    [235, 215],
    [610, 190],
    [975, 225],
    [400, 430],
    [800, 440],
    [200, 620],
    [600, 640],
    [990, 635],
  ];
  return places
    .map(([x = 0, y = 0], index) => {
      const [cx, cy] = [x + wobble(seed, index, 24), y + wobble(seed, index + 30, 18)];
      const flat = blob({
        x: cx - 10,
        y: cy - 6,
        rx: 92,
        ry: 68,
        rough: 0.08,
        seed: seed + index,
        points: 9,
      });
      return (
        pellet(cx, cy, 150 + wobble(seed, index + 60, 14), 3000 + index) +
        line(flat, { width: 3.5 }) +
        shade(flat, 'wide')
      );
    })
    .join('');
}

export const SPECIMEN_VIEWS: Readonly<Record<'button' | 'bar' | 'grain', Views>> = {
  button: { above: buttonAbove, side: buttonSide, under: buttonUnder },
  bar: { above: barAbove, side: barSide, under: barUnder },
  grain: { above: grainAbove, side: grainSide, under: grainUnder },
};

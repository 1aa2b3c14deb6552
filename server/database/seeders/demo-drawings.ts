import type { DemoLot } from './demo-lot.ts';
import { DEMO_LOTS } from './demo-lots.ts';
import { drawSpecimen } from './draw-specimen.ts';

export type Drawing = { caption: string; content: Buffer };

const CAPTIONS = ['from above', 'from the side', 'underside'];
const drawn = new Map<string, Promise<Drawing[]>>();

async function drawLot(lot: DemoLot, seed: number): Promise<Drawing[]> {
  const drawings: Drawing[] = [];
  for (const [index, caption] of CAPTIONS.slice(0, lot.photos).entries()) {
    drawings.push({ caption, content: await drawSpecimen(lot.form, caption, seed * 10 + index) });
  }
  return drawings;
}

/** Begins with the drawings of all lots, one lot after the other, while the rest of the demo waits for its services. */
export function drawAhead(): void {
  let before: Promise<unknown> = Promise.resolve();
  for (const [index, lot] of DEMO_LOTS.entries()) {
    const drawings = before.then(() => drawLot(lot, index + 1));
    // Whoever asks for the drawings hears of a failure.
    before = drawings.catch(() => null);
    drawn.set(lot.key, drawings);
  }
}

/** The drawings of one lot, in the order in which they stand on its page. */
export function drawingsOf(lot: DemoLot): Promise<Drawing[]> {
  const drawings = drawn.get(lot.key);
  if (drawings === undefined) throw new Error(`Nothing was drawn for ${lot.key}`);
  return drawings;
}

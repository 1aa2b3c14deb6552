/** The middle of the values: what half of them stay under. */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((left, right) => left - right);
  return sorted[Math.floor(sorted.length / 2)] ?? Number.NaN;
}

/** Median milliseconds of several works, asked in turn so that a busy moment of the machine meets all of them alike. */
export async function mediansInTurn(
  works: readonly (() => Promise<unknown>)[],
  { warmUp, rounds }: { warmUp: number; rounds: number },
): Promise<number[]> {
  const times: number[][] = works.map(() => []);
  for (let round = 0; round < warmUp + rounds; round += 1) {
    for (const [index, work] of works.entries()) {
      const began = performance.now();
      await work();
      if (round >= warmUp) times[index]!.push(performance.now() - began);
    }
  }
  return times.map(median);
}

export const inTwo = (value: number) => (Math.round(value * 100) / 100).toString();

/** Plain columns, the first to the left, the others to the right. */
export function printTable(
  title: string,
  head: readonly string[],
  rows: readonly (readonly string[])[],
): void {
  const all = [head, ...rows];
  const widths = head.map((_, column) => Math.max(...all.map((row) => (row[column] ?? '').length)));
  const line = (row: readonly string[]) =>
    row
      .map((cell, column) => (column === 0 ? cell.padEnd(widths[0]!) : cell.padStart(widths[column]!)))
      .join('  ');
  process.stdout.write(`\n${title}\n${all.map(line).join('\n')}\n`);
}

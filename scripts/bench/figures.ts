/** One line of a bench: ours beside the reference, or ours beside the limit it must keep. */
export interface Figure {
  what: string;
  unit: string;
  ours: number;
  reference: number | null;
  /** ours / reference. */
  ratio: number | null;
}

export type Bench = (rounds: number) => Promise<Figure[]>;

export function median(values: number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? (sorted[middle] ?? NaN) : ((sorted[middle - 1] ?? NaN) + (sorted[middle] ?? NaN)) / 2;
}

/** The value below which `share` of all values lie. */
export function percentile(values: number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(sorted.length * share))] ?? NaN;
}

const round = (value: number) => Number(value.toPrecision(4));

export function figure(what: string, unit: string, ours: number, reference: number | null = null): Figure {
  return {
    what,
    unit,
    ours: round(ours),
    reference: reference === null ? null : round(reference),
    ratio: reference === null ? null : round(ours / reference),
  };
}

/** Runs ours and the reference in turns, `rounds` times, the first of each changing from round to round. */
export async function inTurns<T>(
  rounds: number,
  ours: () => Promise<T>,
  reference: () => Promise<T>,
): Promise<{ ours: T[]; reference: T[] }> {
  const results = { ours: [] as T[], reference: [] as T[] };
  for (let at = 0; at < rounds; at += 1) {
    const order = at % 2 === 0 ? (['ours', 'reference'] as const) : (['reference', 'ours'] as const);
    for (const which of order) results[which].push(await (which === 'ours' ? ours() : reference()));
    process.stderr.write(
      `round ${at + 1} of ${rounds}: ours ${JSON.stringify(results.ours.at(-1))}, reference ${JSON.stringify(results.reference.at(-1))}\n`,
    );
  }
  return results;
}

/** Seconds that something takes. */
export async function seconds(work: () => Promise<unknown>): Promise<number> {
  const begun = performance.now();
  await work();
  return (performance.now() - begun) / 1000;
}

export function printTable(name: string, figures: Figure[]): void {
  const cell = (value: number | null) => (value === null ? '' : String(value));
  const rows = figures.map(({ what, unit, ours, reference, ratio }) => ({
    what,
    unit,
    ours: cell(ours),
    reference: cell(reference),
    ratio: cell(ratio),
  }));
  console.log(`bench ${name}`);
  console.table(rows);
}

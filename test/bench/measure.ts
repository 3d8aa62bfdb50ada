/** Milliseconds that a piece of work took, over many runs. */
export interface Timing {
  readonly runs: number;
  readonly p50Ms: number;
  readonly p95Ms: number;
}

/** Runs a piece of work until it was seen often enough to tell its usual time from a hiccup of the machine. */
export async function measure(work: () => unknown, { runs = 60, warmUp = 10 } = {}): Promise<Timing> {
  for (let run = 0; run < warmUp; run += 1) await work();
  const times: number[] = [];
  for (let run = 0; run < runs; run += 1) {
    const began = performance.now();
    await work();
    times.push(performance.now() - began);
  }
  times.sort((a, b) => a - b);
  const at = (share: number): number => times[Math.min(times.length - 1, Math.floor(share * times.length))] ?? NaN;
  return { runs, p50Ms: at(0.5), p95Ms: at(0.95) };
}

/** One line of a table, and the same as JSON for whoever compares runs. */
export interface Row extends Timing {
  readonly what: string;
  /** What the figure is held against in the same run, and how many times as long it takes. */
  readonly reference: string | null;
  readonly ratio: number | null;
}

export function besideReference(what: string, timing: Timing, reference: string, referenceTiming: Timing): Row {
  return { what, ...timing, reference, ratio: timing.p50Ms / referenceTiming.p50Ms };
}

export function printRows(rows: readonly Row[]): void {
  const cell = (text: string, width: number): string => text.padEnd(width);
  process.stdout.write(`${cell('what', 46)}${cell('p50 ms', 10)}${cell('p95 ms', 10)}beside\n`);
  for (const { what, p50Ms, p95Ms, reference, ratio } of rows) {
    const beside = reference === null || ratio === null ? '' : `${ratio.toFixed(1)} x ${reference}`;
    process.stdout.write(`${cell(what, 46)}${cell(p50Ms.toFixed(2), 10)}${cell(p95Ms.toFixed(2), 10)}${beside}\n`);
  }
  process.stdout.write(`${JSON.stringify(rows)}\n`);
}

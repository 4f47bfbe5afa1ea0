/** One line of a report. `atLeast` or `atMost` is the bar; a line without one only informs. */
export interface Measured {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly atLeast?: number;
  readonly atMost?: number;
  readonly note?: string;
}

/** What every `*.bench.ts` in this folder exports as `bench`. */
export interface Bench {
  readonly title: string;
  run(): Promise<Measured[]>;
}

export function isReached({ value, atLeast, atMost }: Measured): boolean {
  return (atLeast === undefined || value >= atLeast) && (atMost === undefined || value <= atMost);
}

/** Runs `work` again and again for about `forMs`, at least five times; the time of each run in ms. */
export function timesOf(work: () => void, forMs: number): number[] {
  const times: number[] = [];
  const end = performance.now() + forMs;
  while (times.length < 5 || performance.now() < end) {
    const from = performance.now();
    work();
    times.push(performance.now() - from);
  }
  return times;
}

/** How a measured value is judged. */
export interface BenchValue {
  name: string;
  /** In a few words, for the table. */
  what: string;
  /** Which side of the bounds is good; `within`: between `reach` and `ambition`, as low and high bound. */
  better: 'higher' | 'lower' | 'within';
  reach: number;
  ambition: number | null;
}

/** One measurement; it may give several values. Runs in a process of its own, under `jobs/bench/bench.ts`. */
export interface BenchRow {
  values: BenchValue[];
  /**
   * Measures. Must compare the result of the fast path with a slow one and throw when they differ: a fast wrong
   * answer is no answer.
   */
  run(): Promise<Record<string, number>> | Record<string, number>;
}

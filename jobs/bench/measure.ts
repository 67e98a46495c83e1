/** Rounds of each measurement. */
export const ROUNDS = 7;

/** The middle value. */
export function median(values: number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[sorted.length >> 1];
}

/** Milliseconds a piece of work keeps the processor busy: on a shared machine the wall clock measures the others. */
export async function busyMs(work: () => unknown): Promise<number> {
  const before = process.cpuUsage();
  await work();
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1000;
}

/** Milliseconds by the clock on the wall. */
export async function wallMs(work: () => unknown): Promise<number> {
  const before = performance.now();
  await work();
  return performance.now() - before;
}

/**
 * Medians of several sides, measured in turns so that a slow minute of the machine meets all of them.
 * The first round warms up and does not count.
 */
export async function alternate<Side extends string>(
  sides: Record<Side, () => unknown>,
  measure: (work: () => unknown) => Promise<number> = wallMs,
  rounds = ROUNDS,
): Promise<Record<Side, number>> {
  const times = {} as Record<Side, number[]>;
  const names = Object.keys(sides) as Side[];
  for (let round = 0; round <= rounds; round++) {
    for (const name of names) {
      const time = await measure(sides[name]);
      if (round > 0) (times[name] ??= []).push(time);
    }
  }
  const medians = {} as Record<Side, number>;
  for (const name of names) medians[name] = median(times[name]);
  return medians;
}

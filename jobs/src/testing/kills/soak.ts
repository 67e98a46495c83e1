import { appendFileSync } from 'node:fs';

/** A restart takes seconds on a busy machine, and a count that was interrupted waits for its lease. */
const TIME_PER_KILL_MS = 20_000;
const TIME_ANYWAY_MS = 300_000;

/** How many kills to make: few among the other tests, many when the soak asks for them. */
export function killsWanted({ few }: { few: number }): { kills: number; seed: string; timeoutMs: number } {
  const kills = Number(process.env.STAYLEDGER_KILLS ?? few);
  const seed = process.env.STAYLEDGER_KILL_SEED ?? '1';
  return { kills, seed, timeoutMs: TIME_ANYWAY_MS + kills * TIME_PER_KILL_MS };
}

/** For the soak, which prints what was done. */
export function tellFigures(name: string, figures: unknown): void {
  const report = process.env.STAYLEDGER_KILL_REPORT;
  if (report) appendFileSync(report, `${JSON.stringify({ name, figures })}\n`);
}

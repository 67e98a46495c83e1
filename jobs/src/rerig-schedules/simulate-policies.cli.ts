import { parseArgs } from 'node:util';
import { SeededRandom } from '../demo/seeded-random.js';
import { PlanningThreads } from './planning-threads.js';
import { drawVessel, POLICIES, SIMULATED_YEARS, simulateVessel } from './simulate-policies.js';
import type { PolicyOutcome } from './simulate-policies.js';

/**
 * Compares three ways to decide when parts are replaced, on invented vessels, and prints a table in Markdown:
 * `node jobs/dist/rerig-schedules/simulate-policies.cli.js [--vessels 500] [--seed NAME] [--threads 2]`.
 */

const PLAN_LIMITS = { timeLimitS: 20, relativeGap: 0.01 };

async function main(): Promise<void> {
  const { values } = parseArgs({
    options: {
      vessels: { type: 'string', default: '500' },
      seed: { type: 'string', default: 'policies' },
      threads: { type: 'string', default: '2' },
    },
  });
  const vesselCount = Number(values.vessels);
  const threads = new PlanningThreads(Number(values.threads), { niceness: 0 });
  try {
    const rows = await Promise.all(
      POLICIES.map(async (policy) => {
        const outcomes = await Promise.all(
          Array.from({ length: vesselCount }, (_, at) =>
            simulateVessel(drawVessel(new SeededRandom(`${values.seed} ${at}`)), policy, (input) =>
              threads.ask('plan', { input, limits: PLAN_LIMITS }),
            ),
          ),
        );
        return rowOf(policy, outcomes);
      }),
    );
    process.stdout.write(
      [
        `${vesselCount} invented vessels over ${SIMULATED_YEARS} years, seed "${values.seed}"; per vessel, mean and its standard error:`,
        '',
        '| parts are replaced by | cost, EUR a year | visits | mast out | parts replaced | parts past their date | days past, part-days a year |',
        '| --- | ---: | ---: | ---: | ---: | ---: | ---: |',
        ...rows,
        '',
      ].join('\n'),
    );
  } finally {
    await threads.close();
  }
}

function rowOf(policy: string, outcomes: readonly PolicyOutcome[]): string {
  const figure = (of: (outcome: PolicyOutcome) => number, digits: number): string => {
    const values = outcomes.map(of);
    const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
    const variance = values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1);
    return `${mean.toFixed(digits)} ± ${Math.sqrt(variance / values.length).toFixed(digits)}`;
  };
  const past = outcomes.reduce((sum, { partsPast }) => sum + partsPast, 0);
  const replaced = outcomes.reduce((sum, outcome) => sum + outcome.replaced, 0);
  return `| ${[
    policy,
    figure(({ costMinor }) => costMinor / 100 / SIMULATED_YEARS, 0),
    figure(({ visits }) => visits, 1),
    figure(({ mastOutVisits }) => mastOutVisits, 1),
    figure((outcome) => outcome.replaced, 1),
    `${figure(({ partsPast }) => partsPast, 2)} (${((100 * past) / replaced).toFixed(1)} % of those replaced)`,
    figure(({ daysPast }) => daysPast / SIMULATED_YEARS, 1),
  ].join(' | ')} |`;
}

main().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
});

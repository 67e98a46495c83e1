import { severalProcesses } from '../testing/kills/topology.js';
import { KillRun } from '../testing/kills/kill-run.js';
import { killsWanted, tellFigures } from '../testing/kills/soak.js';

const { kills, seed, timeoutMs } = killsWanted({ few: 6 });
jest.setTimeout(timeoutMs);

describe('API, workers and Redis, killed at random moments', () => {
  let run: KillRun | undefined;
  beforeAll(async () => {
    run = await KillRun.prepare(`several processes ${seed}`, severalProcesses);
  });
  afterAll(() => run?.end());

  it('loses no acknowledged byte, does nothing twice, and leaves every log to be acted on', async () => {
    const figures = await run?.run(kills);
    tellFigures('several processes', figures);
    expect(Object.values(figures?.kills ?? {}).reduce((total, n) => total + n, 0)).toBe(kills);
  });
});

import { inventedFirm, inventedVessel } from '@stayledger/shared/rerig-schedule/invented-fleet';
import { smallRandom } from '@stayledger/shared/rerig-schedule/small-plans';
import { planVessel } from '@stayledger/shared/rerig-schedule/plan-vessel';
import { loadSolver } from './load-solver.js';
import { PlanningThreads } from './planning-threads.js';

const EXACT = { timeLimitS: 60, relativeGap: 0 };
const FROM = { asOfOn: '2027-01-10', windowsFromOn: '2026-10-15', taskCount: 6, windowCount: 12 };

describe('planning in threads', () => {
  // Full priority: what else runs on the machine must not decide whether a test is in time.
  const threads = new PlanningThreads(2, { niceness: 0 });
  afterAll(() => threads.close());

  it('gives the plan that this thread gives', async () => {
    const input = inventedVessel({ ...FROM, random: smallRandom(3) });
    const [there, here] = [
      await threads.ask('plan', { input, limits: EXACT }),
      planVessel(input, await loadSolver(), EXACT),
    ];
    expect(there.totalMinor).toBe(here.totalMinor);
    expect(there.proof).toEqual(here.proof);
    expect(there.visits.length).toBeGreaterThan(0);
  });

  it('explains it and changes it', async () => {
    const input = inventedVessel({ ...FROM, random: smallRandom(4) });
    const plan = await threads.ask('plan', { input, limits: EXACT });
    const reasons = await threads.ask('explain', { input, plan });
    expect(reasons).toHaveLength(plan.visits.flatMap(({ tasks }) => tasks).length);
    const [{ windowId }] = plan.visits;
    const changed = await threads.ask('change', {
      input,
      plan,
      change: { change: 'drop', windowId },
      limits: EXACT,
    });
    expect(changed.plan.visits.map((visit) => visit.windowId)).not.toContain(windowId);
    expect([changed.diff.costMinor > 0, changed.diff.lateDays > 0]).toContain(true);
  });

  it('plans a firm and tells how far it is', async () => {
    const firm = inventedFirm({
      ...FROM,
      random: smallRandom(5),
      vesselCount: 6,
      hoursPerVessel: 20,
      berthsPerVessel: 0.34,
      lateDayCostMinor: 50_000,
    });
    const bounds: number[] = [];
    const plan = await threads.planFirm(firm, {
      timeLimitS: 60,
      targetGap: 0.01,
      onProgress: ({ boundMinor }) => bounds.push(boundMinor),
    });
    expect(plan.vessels).toHaveLength(6);
    expect(plan.proof.boundMinor).toBeLessThanOrEqual(plan.proof.weightMinor);
    expect(plan.windows.some(({ isOverfull }) => isOverfull)).toBe(false);
    expect(bounds.length).toBeGreaterThan(1);
    expect(bounds).toEqual([...bounds].sort((one, other) => one - other));
  }, 90_000);

  it('passes on what is wrong with the input', async () => {
    const input = { ...inventedVessel({ ...FROM, random: smallRandom(6) }), contingencyShare: -1 };
    await expect(threads.ask('plan', { input })).rejects.toThrow(
      'The contingency must be a share from 0 to 1.',
    );
  });

  it('ends a thread when told to', async () => {
    const input = inventedVessel({ ...FROM, taskCount: 14, windowCount: 48, random: smallRandom(7) });
    const controller = new AbortController();
    const asked = threads.ask('alternatives', { input, limits: EXACT }, controller.signal);
    setTimeout(() => controller.abort(), 50);
    await expect(asked).rejects.toThrow(/abort/i);
  });
});

import loadHighs from 'highs';
import { beforeAll, describe, expect, it } from 'vitest';
import { changePlan } from './change-plan.js';
import { diffPlans } from './diff-plans.js';
import { explainPlan } from './explain-plan.js';
import { explanationWords } from './explanation-words.js';
import { highsSolver } from './highs-solver.js';
import type { ProgramSolver } from './mixed-integer-program.js';
import { planAlternatives } from './plan-alternatives.js';
import { NO_DECISIONS } from './plan-input.js';
import type { PlanInput, PlanTask } from './plan-input.js';
import { planVessel } from './plan-vessel.js';
import { smallPlan, smallRandom } from './small-plans.js';

const EXACT = { timeLimitS: 60, relativeGap: 0 };

let solver: ProgramSolver;
beforeAll(async () => {
  solver = highsSolver(await loadHighs());
});

function mastOutTask(id: string, name: string, dueOn: string, costMinor: number): PlanTask {
  return {
    id,
    name,
    partIds: [id],
    action: 'replace',
    ground: 'replace-by',
    dueOn,
    againAfterDays: 3652,
    terms: { 'mast-out-afloat': { costMinor, hours: 10 } },
    leadDays: 0,
    alsoDoneBy: [],
    needs: [],
  };
}

/**
 * By hand: three yearly windows. The forestay is due in May 2029 and cannot wait beyond the first (a); the cap shrouds
 * are due in March 2030 and fit a or b; the backstay is due in December 2030 and fits any.
 * Cheapest: all three in a, (3,000 + 1,500 + 2,500 + 900) x 1.2 = 9,480.
 * Waiting with the cap shrouds: a visit more, in b. 3,000 x 1.2 = 3,600 more.
 */
const input: PlanInput = {
  asOfOn: '2028-01-10',
  horizonEndOn: '2031-06-30',
  currency: 'EUR',
  visitTerms: { 'mast-out-afloat': { costMinor: 300_000, hours: 16 } },
  contingencyShare: 0.2,
  orderMarginDays: 14,
  windows: ['2028', '2029', '2030'].map((year, at) => ({
    id: 'abc'[at],
    opensOn: `${year}-10-15`,
    closesOn: `${year}-12-20`,
    kinds: ['mast-out-afloat'],
  })),
  tasks: [
    mastOutTask('forestay', 'forestay', '2029-05-01', 150_000),
    mastOutTask('caps', 'cap shrouds', '2030-03-14', 250_000),
    mastOutTask('backstay', 'backstay', '2030-12-01', 90_000),
  ],
  decisions: NO_DECISIONS,
};

describe('explanations', () => {
  it('say what waiting costs and what the visit is for', () => {
    const plan = planVessel(input, solver, EXACT);
    expect(plan.totalMinor).toBe(948_000);
    const [forestay, caps, backstay] = explainPlan(input, plan, solver);
    // In b (15 October 2029) the forestay is 167 days past 1 May.
    expect(forestay).toMatchObject({ because: 'cannot-wait', waiting: { lateDays: 167 } });
    expect(caps).toMatchObject({
      because: 'shares-visit',
      sharedWith: [{ taskId: 'forestay' }],
      waiting: { windowId: 'b', costMinor: 360_000, mastOutVisits: 1, lateDays: 0 },
      earlier: null,
    });
    expect(backstay.waiting).toMatchObject({ costMinor: 360_000, mastOutVisits: 1 });
    const words = explanationWords(caps, plan, {
      day: (day) => day.slice(0, 7),
      money: (minor) => `${minor / 100} EUR`,
    });
    expect(words).toBe(
      'Replace by 2030-03; taken in the visit of 2028-10 because the mast is out for forestay; waiting would cost 3600 EUR and take the mast out once more.',
    );
  });
});

describe('changes by hand', () => {
  it('splits a visit and shows what it costs and what else moves', () => {
    const plan = planVessel(input, solver, EXACT);
    const split = changePlan(
      input,
      plan,
      { change: 'split', fromWindowId: 'a', toWindowId: 'b', taskIds: ['caps'] },
      solver,
      EXACT,
    );
    // One visit more, 3,600; the backstay costs the same in either and may stay or move along.
    expect(split.diff).toMatchObject({ costMinor: 360_000, visitCount: 1, lateDays: 0 });
    expect(split.diff.visitsAdded).toEqual([{ windowId: 'b', kind: 'mast-out-afloat' }]);
    expect(split.diff.tasksMoved).toContainEqual(
      expect.objectContaining({ taskId: 'caps', fromWindowId: 'a', toWindowId: 'b' }),
    );
    expect(split.diff.causes).toEqual([{ cause: 'decisions-changed' }]);
    const undone = planVessel({ ...split.input, decisions: input.decisions }, solver, EXACT);
    expect(diffPlans({ input, plan }, { input, plan: undone }).isSame).toBe(true);
  });

  it('moves a visit, late or not, with everything in it', () => {
    const plan = planVessel(input, solver, EXACT);
    const moved = changePlan(
      input,
      plan,
      { change: 'move', fromWindowId: 'a', toWindowId: 'b' },
      solver,
      EXACT,
    );
    expect(moved.plan.visits.map(({ windowId, locked }) => [windowId, locked])).toEqual([['b', true]]);
    expect(moved.diff).toMatchObject({ costMinor: 0, visitCount: 0, lateDays: 167 });
    expect(moved.plan.lateTasks).toMatchObject([{ taskId: 'forestay', reason: 'settled-by-hand' }]);
  });

  it('drops a visit', () => {
    const plan = planVessel(input, solver, EXACT);
    const dropped = changePlan(input, plan, { change: 'drop', windowId: 'a' }, solver, EXACT);
    expect(dropped.plan.visits.map(({ windowId }) => windowId)).toEqual(['b']);
    expect(dropped.diff.lateDays).toBe(167);
    expect(() => changePlan(input, plan, { change: 'lock', windowId: 'c' }, solver, EXACT)).toThrow(
      /no visit in window c/,
    );
  });

  it('keeps a locked visit when dates move, and names the dates that moved', () => {
    const plan = planVessel(input, solver, EXACT);
    const locked = changePlan(input, plan, { change: 'lock', windowId: 'a' }, solver, EXACT);
    expect(locked.diff).toMatchObject({ isSame: true, costMinor: 0 });
    const later: PlanInput = {
      ...locked.input,
      tasks: [{ ...input.tasks[0], dueOn: '2030-05-01' }, ...input.tasks.slice(1)],
    };
    const replanned = planVessel(later, solver, EXACT);
    expect(replanned.visits.map(({ windowId }) => windowId)).toContain('a');
    expect(diffPlans(locked, { input: later, plan: replanned }).causes).toEqual([
      {
        cause: 'due-date-moved',
        taskId: 'forestay',
        name: 'forestay',
        fromOn: '2029-05-01',
        toOn: '2030-05-01',
      },
    ]);
  });
});

describe('alternatives', () => {
  it('are each the best by their own measure', () => {
    for (let seed = 1; seed <= 60; seed++) {
      const case_ = smallPlan(smallRandom(seed), { windows: 7, tasks: 4, coupled: false });
      const plans = planAlternatives(case_, solver, EXACT);
      const all = Object.values(plans);
      const late = all.map(({ lateDays }) => lateDays);
      expect(new Set(late).size, `seed ${seed}`).toBe(1);
      const least = (figures: number[]): number => Math.min(...figures);
      expect(plans['least-cost'].totalMinor, `seed ${seed}`).toBe(
        least(all.map(({ totalMinor }) => totalMinor)),
      );
      expect(plans['fewest-visits'].visits.length, `seed ${seed}`).toBe(
        least(all.map(({ visits }) => visits.length)),
      );
    }
  });
});

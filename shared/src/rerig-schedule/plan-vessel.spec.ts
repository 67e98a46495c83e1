import loadHighs from 'highs';
import { beforeAll, describe, expect, it } from 'vitest';
import { dayNumber } from '../fatigue/life/days.js';
import { highsSolver } from './highs-solver.js';
import type { ProgramSolver } from './mixed-integer-program.js';
import { NO_DECISIONS } from './plan-input.js';
import type { PlanInput, PlanTask, PlanWindow, VisitKind } from './plan-input.js';
import { planVessel } from './plan-vessel.js';
import { smallPlan, smallRandom } from './small-plans.js';
import { vesselModel } from './vessel-model.js';
import { solveVessel } from './solve-vessel.js';

const EXACT = { timeLimitS: 60, relativeGap: 0 };

let solver: ProgramSolver;
beforeAll(async () => {
  solver = highsSolver(await loadHighs());
});

interface Best {
  lateDays: number;
  totalMinor: number;
}

function isBetter(one: Best, other: Best): boolean {
  return (
    one.lateDays < other.lateDays || (one.lateDays === other.lateDays && one.totalMinor < other.totalMinor)
  );
}

/** Windows still to come within the horizon, with their first working day; read from the input anew. */
function comingWindows(input: PlanInput): { window: PlanWindow; startDay: number; closeDay: number }[] {
  const asOf = dayNumber(input.asOfOn);
  return input.windows
    .map((window) => ({
      window,
      startDay: Math.max(asOf, dayNumber(window.opensOn)),
      closeDay: dayNumber(window.closesOn),
    }))
    .filter(({ startDay, closeDay }) => closeDay >= asOf && startDay <= dayNumber(input.horizonEndOn));
}

function withContingency(costMinor: number, kind: VisitKind, share: number): number {
  return costMinor + (kind === 'aloft' ? 0 : Math.round(costMinor * share));
}

/** Every way to give each window a kind of visit or none; per way, each task by itself takes its cheapest windows. */
function bestByTryingVisits(input: PlanInput): Best {
  const windows = comingWindows(input);
  const horizon = dayNumber(input.horizonEndOn);
  const asOf = dayNumber(input.asOfOn);
  let best: Best = { lateDays: Infinity, totalMinor: Infinity };
  const kinds: (VisitKind | null)[] = windows.map(() => null);

  const cheapestFrom = (task: PlanTask, at: number, due: number): Best => {
    // Not again: late if the horizon outlasts it.
    let found: Best = { lateDays: Math.max(0, horizon - due), totalMinor: 0 };
    for (let next = at; next < windows.length; next++) {
      const kind = kinds[next];
      const terms = kind === null ? undefined : task.terms[kind];
      const doneDay = Math.max(windows[next].startDay, asOf + task.leadDays);
      const isKept = input.decisions.kept.some(
        (keep) => keep.taskId === task.id && keep.windowId === windows[next].window.id,
      );
      if (kind === null || terms === undefined || isKept || doneDay > windows[next].closeDay) continue;
      const again = task.againAfterDays === null ? Infinity : doneDay + task.againAfterDays;
      const rest = cheapestFrom(task, next + 1, again);
      const here: Best = {
        lateDays: Math.max(0, doneDay - due) + rest.lateDays,
        totalMinor: withContingency(terms.costMinor, kind, input.contingencyShare) + rest.totalMinor,
      };
      if (isBetter(here, found)) found = here;
    }
    return found;
  };
  const tryFrom = (at: number, visitsMinor: number): void => {
    if (at < windows.length) {
      const { id } = windows[at].window;
      const locked = input.decisions.locked.filter(({ windowId }) => windowId === id).map(({ kind }) => kind);
      const isBarred = (kind: VisitKind): boolean =>
        input.decisions.barred.some(
          (bar) => bar.windowId === id && (bar.kind === undefined || bar.kind === kind),
        );
      kinds[at] = null;
      if (locked.length === 0) tryFrom(at + 1, visitsMinor);
      const offered = locked.length > 0 ? locked : windows[at].window.kinds.filter((kind) => !isBarred(kind));
      for (const kind of offered) {
        kinds[at] = kind;
        const costMinor = withContingency(input.visitTerms[kind]!.costMinor, kind, input.contingencyShare);
        tryFrom(at + 1, visitsMinor + costMinor);
      }
      kinds[at] = null;
      return;
    }
    const sum: Best = { lateDays: 0, totalMinor: visitsMinor };
    for (const task of input.tasks) {
      if (task.dueOn === null) continue;
      const own = cheapestFrom(task, 0, dayNumber(task.dueOn));
      sum.lateDays += own.lateDays;
      sum.totalMinor += own.totalMinor;
    }
    if (isBetter(sum, best)) best = sum;
  };
  tryFrom(0, 0);
  return best;
}

/** Every set of windows for every task; a window then takes the cheapest kind of visit that allows all its tasks. */
function bestByTryingTasks(input: PlanInput): Best {
  const windows = comingWindows(input);
  const horizon = dayNumber(input.horizonEndOn);
  const asOf = dayNumber(input.asOfOn);
  const { tasks } = input;
  const doneDay = (task: PlanTask, at: number): number =>
    Math.max(windows[at].startDay, asOf + task.leadDays);
  const sets: number[] = tasks.map(() => 0);
  let best: Best = { lateDays: Infinity, totalMinor: Infinity };

  const evaluate = (): void => {
    let totalMinor = 0;
    for (let at = 0; at < windows.length; at++) {
      const here = tasks.filter((_, task) => sets[task] & (1 << at));
      if (here.length === 0) continue;
      if (here.some((task) => doneDay(task, at) > windows[at].closeDay)) return;
      if (here.some((task) => task.needs.some((id) => !here.some((other) => other.id === id)))) return;
      const costs = windows[at].window.kinds
        .filter((kind) => here.every((task) => task.terms[kind] !== undefined))
        .map((kind) =>
          here
            .map((task) => withContingency(task.terms[kind]!.costMinor, kind, input.contingencyShare))
            .reduce(
              (sum, costMinor) => sum + costMinor,
              withContingency(input.visitTerms[kind]!.costMinor, kind, input.contingencyShare),
            ),
        );
      if (costs.length === 0) return;
      totalMinor += Math.min(...costs);
    }
    let lateDays = 0;
    for (const task of tasks) {
      if (task.dueOn === null) continue;
      let due = dayNumber(task.dueOn);
      for (let at = 0; at < windows.length; at++) {
        // Another task's doing counts on the same day, in a window whose kinds allow this task too.
        const possible =
          doneDay(task, at) <= windows[at].closeDay &&
          windows[at].window.kinds.some((kind) => task.terms[kind] !== undefined);
        const counts = tasks.some(
          (other, index) =>
            (sets[index] & (1 << at)) !== 0 &&
            (other === task ||
              (task.alsoDoneBy.includes(other.id) && doneDay(other, at) === doneDay(task, at) && possible)),
        );
        if (!counts) continue;
        lateDays += Math.max(0, doneDay(task, at) - due);
        due = task.againAfterDays === null ? Infinity : doneDay(task, at) + task.againAfterDays;
      }
      lateDays += Math.max(0, horizon - due);
    }
    const here = { lateDays, totalMinor };
    if (isBetter(here, best)) best = here;
  };
  const tryTask = (task: number): void => {
    if (task === tasks.length) return evaluate();
    for (let set = 0; set < 1 << windows.length; set++) {
      sets[task] = set;
      tryTask(task + 1);
    }
    sets[task] = 0;
  };
  tryTask(0);
  return best;
}

describe('the optimum against trying everything', () => {
  it.each([1, 2, 3, 4])('equals it on 75 cases of up to 5 tasks and 8 windows (block %i)', (block) => {
    for (let at = 0; at < 75; at++) {
      const seed = block * 1000 + at;
      const input = smallPlan(smallRandom(seed), { windows: 8, tasks: 5, coupled: false });
      const plan = planVessel(input, solver, EXACT);
      expect({ seed, lateDays: plan.lateDays, totalMinor: plan.totalMinor }).toEqual({
        seed,
        ...bestByTryingVisits(input),
      });
      expect(plan.proof.boundMinor).toBe(plan.totalMinor);
    }
  });

  it.each([1, 2])('equals it on 60 cases with visits locked and barred by hand (block %i)', (block) => {
    for (let at = 0; at < 60; at++) {
      const seed = block * 9000 + at;
      const input = smallPlan(smallRandom(seed), { windows: 7, tasks: 4, coupled: false, settled: true });
      const plan = planVessel(input, solver, EXACT);
      expect({ seed, lateDays: plan.lateDays, totalMinor: plan.totalMinor }).toEqual({
        seed,
        ...bestByTryingVisits(input),
      });
    }
  });

  it.each([1, 2])('equals it on 60 cases whose tasks ask for one another (block %i)', (block) => {
    for (let at = 0; at < 60; at++) {
      const seed = block * 5000 + at;
      const input = smallPlan(smallRandom(seed), { windows: 4, tasks: 3, coupled: true });
      const plan = planVessel(input, solver, EXACT);
      expect({ seed, lateDays: plan.lateDays, totalMinor: plan.totalMinor }).toEqual({
        seed,
        ...bestByTryingTasks(input),
      });
    }
  });

  it('is the same by paths and by covered stretches', () => {
    for (let seed = 1; seed <= 100; seed++) {
      const model = vesselModel(
        smallPlan(smallRandom(seed), { windows: 8, tasks: 5, coupled: seed % 2 === 0 }),
      );
      const [paths, stretches] = (['arcs', 'covering'] as const).map((formulation) =>
        solveVessel(model, { formulation, minimise: 'cost' }, solver, EXACT),
      );
      expect({ seed, objective: paths?.objective }).toEqual({
        seed,
        objective: stretches === null ? undefined : expect.closeTo(stretches.objective, 4),
      });
    }
  });
});

/** Two yearly lay-ups by hand: 2028 and 2029, and one task due in May 2029 that the second lay-up would miss. */
const twoYears: PlanInput = {
  asOfOn: '2028-01-10',
  horizonEndOn: '2030-06-30',
  currency: 'EUR',
  visitTerms: {
    aloft: { costMinor: 40_000, hours: 3 },
    'mast-out-afloat': { costMinor: 300_000, hours: 16 },
  },
  contingencyShare: 0.2,
  orderMarginDays: 14,
  windows: [
    { id: 'autumn-2028', opensOn: '2028-10-15', closesOn: '2029-03-31', kinds: ['aloft', 'mast-out-afloat'] },
    { id: 'autumn-2029', opensOn: '2029-10-15', closesOn: '2030-03-31', kinds: ['aloft', 'mast-out-afloat'] },
  ],
  tasks: [
    {
      id: 'forestay',
      name: 'forestay',
      partIds: ['fs'],
      action: 'replace',
      ground: 'replace-by',
      dueOn: '2029-05-01',
      againAfterDays: 3652,
      terms: { 'mast-out-afloat': { costMinor: 150_000, hours: 10 } },
      leadDays: 56,
      alsoDoneBy: [],
      needs: [],
    },
    {
      id: 'caps',
      name: 'cap shrouds',
      partIds: ['v1-p', 'v1-s'],
      action: 'replace',
      ground: 'replace-by',
      dueOn: '2030-03-14',
      againAfterDays: 3652,
      terms: { 'mast-out-afloat': { costMinor: 250_000, hours: 14 } },
      leadDays: 56,
      alsoDoneBy: [],
      needs: [],
    },
  ],
  decisions: NO_DECISIONS,
};

describe('a plan worked by hand', () => {
  // The forestay is due in May 2029, so only the lay-up of 2028 will do. The cap shrouds could wait for that of 2029, but
  // that takes the mast out twice. One visit: (3,000 + 1,500 + 2,500) x 1.2 = 8,400. Two: that + 3,000 x 1.2 = 12,000.
  it('takes the cap shrouds while the mast is out for the forestay', () => {
    const plan = planVessel(twoYears, solver, EXACT);
    expect(plan.visits.map(({ windowId, kind }) => [windowId, kind])).toEqual([
      ['autumn-2028', 'mast-out-afloat'],
    ]);
    expect(plan.totalMinor).toBe(840_000);
    expect(plan.hours).toBe(16 + 10 + 14);
    expect(plan.lateTasks).toEqual([]);
    const [visit] = plan.visits;
    // Order by 15 October less 56 days of lead and 14 of margin: 70 days earlier is 6 August.
    expect(visit.tasks.map(({ taskId, dueOn, orderByOn }) => [taskId, dueOn, orderByOn])).toEqual([
      ['forestay', '2029-05-01', '2028-08-06'],
      ['caps', '2030-03-14', '2028-08-06'],
    ]);
    expect(visit.doneByOn).toBe('2029-03-31');
  });

  // With latest-allowed each task waits for its last window: two visits, 12,000.
  it('takes each part when it is due if asked to', () => {
    const plan = planVessel(twoYears, solver, EXACT, { preference: 'latest-allowed' });
    expect(plan.visits.map(({ windowId, tasks }) => [windowId, tasks.map(({ taskId }) => taskId)])).toEqual([
      ['autumn-2028', ['forestay']],
      ['autumn-2029', ['caps']],
    ]);
    expect(plan.totalMinor).toBe(1_200_000);
  });

  it('gives the least-late plan and the reason where a part is overdue', () => {
    const overdue = {
      ...twoYears,
      tasks: [{ ...twoYears.tasks[0], dueOn: '2027-12-31' }, twoYears.tasks[1]],
    };
    const plan = planVessel(overdue, solver, EXACT);
    // 31 December 2027 to 15 October 2028: 366 days of 2028 less 31 October days after the 15th (16), 30 and 31: 289.
    expect(plan.lateDays).toBe(289);
    expect(plan.lateTasks).toMatchObject([
      { taskId: 'forestay', doneOn: '2028-10-15', reason: 'overdue-already' },
    ]);
    expect(plan.totalMinor).toBe(840_000);
  });

  it('names the decision that makes a part late', () => {
    const barred = {
      ...twoYears,
      decisions: { ...NO_DECISIONS, barred: [{ windowId: 'autumn-2028' }] },
    };
    const plan = planVessel(barred, solver, EXACT);
    // 1 May to 15 October 2029: 30 + 30 + 31 + 31 + 30 + 15 = 167 days.
    expect(plan.lateDays).toBe(167);
    expect(plan.lateTasks).toMatchObject([{ taskId: 'forestay', reason: 'settled-by-hand' }]);
  });

  // The booked visit stays (400) and does nothing for the rig; both parts wait for 2029: 8,400 + 400.
  it('keeps a booked visit, and says which wish it makes impossible', () => {
    const decisions = {
      ...NO_DECISIONS,
      locked: [{ windowId: 'autumn-2028', kind: 'aloft' as const }],
      pinned: [{ taskId: 'forestay', windowId: 'autumn-2028' }],
    };
    const plan = planVessel({ ...twoYears, decisions }, solver, EXACT);
    expect(plan.remarks).toEqual([expect.stringContaining('forestay cannot be done in window autumn-2028')]);
    expect(plan.visits.map(({ windowId, locked }) => [windowId, locked])).toEqual([
      ['autumn-2028', true],
      ['autumn-2029', false],
    ]);
    expect(plan.totalMinor).toBe(880_000);
    expect(plan.lateDays).toBe(167);
  });

  it('plans without decisions that contradict each other, and says so', () => {
    const aloftOnly = { ...twoYears.tasks[0], id: 'lashings', name: 'lashings', dueOn: '2031-01-01' };
    const input: PlanInput = {
      ...twoYears,
      tasks: [...twoYears.tasks, { ...aloftOnly, terms: { aloft: { costMinor: 20_000, hours: 4 } } }],
      decisions: {
        ...NO_DECISIONS,
        pinned: ['caps', 'lashings'].map((taskId) => ({ taskId, windowId: 'autumn-2028' })),
      },
    };
    const plan = planVessel(input, solver, EXACT);
    expect(plan.remarks).toEqual([expect.stringContaining('contradicts itself')]);
    expect(plan.totalMinor).toBe(840_000);
  });

  it('plans nothing where nothing has a date', () => {
    const undated = { ...twoYears, tasks: twoYears.tasks.map((task) => ({ ...task, dueOn: null })) };
    const plan = planVessel(undated, solver, EXACT);
    expect(plan.visits).toEqual([]);
    expect(plan.withoutDate).toEqual(['forestay', 'cap shrouds']);
    expect(plan.proof).toEqual({ ended: 'proven', boundMinor: 0, gap: 0 });
  });

  it('says so where no window allows a task', () => {
    const plan = planVessel({ ...twoYears, windows: [] }, solver, EXACT);
    expect(plan.visits).toEqual([]);
    expect(plan.lateTasks.map(({ reason, doneOn }) => [reason, doneOn])).toEqual([
      ['nothing-allows-it', null],
      ['nothing-allows-it', null],
    ]);
  });

  it.each([
    [
      'a visit that costs nothing',
      { visitTerms: { aloft: { costMinor: 0, hours: 3 } } },
      /cost more than nothing/,
    ],
    [
      'a window that closes before it opens',
      { windows: [{ ...twoYears.windows[0], closesOn: '2028-01-01' }] },
      /closes before/,
    ],
    ['a day that does not exist', { asOfOn: '2027-02-29' }, /not a calendar day/],
    ['a task twice', { tasks: [twoYears.tasks[0], twoYears.tasks[0]] }, /given twice/],
    [
      'a cost below nothing',
      { tasks: [{ ...twoYears.tasks[0], terms: { aloft: { costMinor: -1, hours: 1 } } }] },
      /0 or more/,
    ],
  ])('refuses %s', (_, change, words) => {
    expect(() => planVessel({ ...twoYears, ...change }, solver, EXACT)).toThrow(words);
  });
});

describe('properties', () => {
  const cases = Array.from({ length: 80 }, (_, at) => at + 1);
  const plan = (input: PlanInput) => planVessel(input, solver, EXACT);

  it('a cheaper visit never raises the total', () => {
    for (const seed of cases) {
      const input = smallPlan(smallRandom(seed), { windows: 7, tasks: 5, coupled: false });
      const cheaper = Object.fromEntries(
        Object.entries(input.visitTerms).map(([kind, terms]) => [
          kind,
          { ...terms, costMinor: Math.ceil(terms.costMinor * 0.8) },
        ]),
      );
      const [before, after] = [plan(input), plan({ ...input, visitTerms: cheaper })];
      expect({ seed, lateDays: after.lateDays }).toEqual({ seed, lateDays: before.lateDays });
      expect(after.totalMinor, `seed ${seed}`).toBeLessThanOrEqual(before.totalMinor);
    }
  });

  it('a kind of visit more in a window, or a window that closes later, never makes a plan later or, in time, dearer', () => {
    for (const seed of cases) {
      const input = smallPlan(smallRandom(seed), { windows: 7, tasks: 5, coupled: false });
      const windows = input.windows.map((window) => ({
        ...window,
        closesOn:
          window.closesOn.replace(/-\d\d$/, '-28') > window.closesOn
            ? window.closesOn.replace(/-\d\d$/, '-28')
            : window.closesOn,
        kinds: [...new Set([...window.kinds, 'mast-out-ashore' as const])],
      }));
      const [before, after] = [plan(input), plan({ ...input, windows })];
      expect(after.lateDays, `seed ${seed}`).toBeLessThanOrEqual(before.lateDays);
      if (before.lateDays === after.lateDays) {
        expect(after.totalMinor, `seed ${seed}`).toBeLessThanOrEqual(before.totalMinor);
      }
    }
  });

  it('nothing is late where every window takes every kind of visit and every task allows one', () => {
    for (const seed of cases) {
      const input = smallPlan(smallRandom(seed), { windows: 8, tasks: 5, coupled: false });
      const everywhere: PlanInput = {
        ...input,
        horizonEndOn: '2029-06-01',
        // A window every 90 days from the first, each open for three months.
        windows: Array.from({ length: 10 }, (_, at) => ({
          id: `q${at}`,
          opensOn: `${2027 + Math.floor((at + 1) / 4)}-${['01', '04', '07', '10'][(at + 1) % 4]}-01`,
          closesOn: `${2027 + Math.floor((at + 1) / 4)}-${['03', '06', '09', '12'][(at + 1) % 4]}-28`,
          kinds: ['mast-out-ashore'],
        })),
        tasks: input.tasks.map((task) => ({
          ...task,
          dueOn: task.dueOn === null || task.dueOn < '2027-06-01' ? '2027-06-01' : task.dueOn,
          terms: { ...task.terms, 'mast-out-ashore': { costMinor: 50_000, hours: 4 } },
        })),
      };
      expect({ seed, late: plan(everywhere).lateTasks }).toEqual({ seed, late: [] });
    }
  });
});

import { join } from 'node:path';
import { inventedFirm, inventedVessel } from '@stayledger/shared/rerig-schedule/invented-fleet';
import { dutyOutcomes } from '@stayledger/shared/rerig-schedule/read-plan';
import { planVessel } from '@stayledger/shared/rerig-schedule/plan-vessel';
import { solveVessel } from '@stayledger/shared/rerig-schedule/solve-vessel';
import { vesselModel } from '@stayledger/shared/rerig-schedule/vessel-model';
import type { FirmInput } from '@stayledger/shared/rerig-schedule/firm-input';
import type { FirmPlan } from '@stayledger/shared/rerig-schedule/firm-plan';
import { loadSolver } from '../src/rerig-schedules/load-solver.js';
import { PlanningThreads } from '../src/rerig-schedules/planning-threads.js';
import type { BenchRow } from './bench-row.js';
import { median } from './measure.js';
import { seededRandom } from './seeded-random.js';

const FROM = { asOfOn: '2027-01-10', windowsFromOn: '2026-10-15', taskCount: 12, windowCount: 24 };
const VESSELS = 21;
const VESSEL_LIMITS = { timeLimitS: 10, relativeGap: 0.01 };
const FIRM_VESSELS = 100;
const FIRM_LIMIT_S = 120;
const FIRM_GAP = 0.01;
/** Two cores are counted on. */
const THREADS = 2;

/** A vessel of 12 groups and 24 windows to a gap of 1 %; 21 invented ones, the middle time and the worst gap. */
export const planVesselRow: BenchRow = {
  values: [
    {
      name: 'planVesselMs',
      what: 'ms to plan a vessel, 12 groups x 24 windows, to 1 %',
      better: 'lower',
      reach: 1000,
      ambition: 100,
    },
    {
      name: 'planVesselGap',
      what: 'worst proven gap of 21 such plans',
      better: 'lower',
      reach: 0.01,
      ambition: 0.005,
    },
  ],
  async run() {
    const solver = await loadSolver();
    const times: number[] = [];
    let worstGap = 0;
    for (let seed = 0; seed <= VESSELS; seed++) {
      const input = inventedVessel({ ...FROM, random: seededRandom(seed) });
      const began = performance.now();
      const plan = planVessel(input, solver, VESSEL_LIMITS);
      // The first one warms up.
      if (seed > 0) times.push(performance.now() - began);
      worstGap = Math.max(worstGap, plan.proof.gap);
      // The other formulation is the slow path: it may not find a plan cheaper than the bound of the fast one.
      const paths = solveVessel(
        vesselModel(input),
        { formulation: 'arcs', minimise: 'cost' },
        solver,
        VESSEL_LIMITS,
      );
      if (paths === null || plan.lateDays > 0) throw new Error(`seed ${seed}: no plan in time`);
      if (paths.objective * 100 < plan.proof.boundMinor - 1) {
        throw new Error(
          `seed ${seed}: paths cost ${paths.objective * 100}, below the bound ${plan.proof.boundMinor}`,
        );
      }
      if (paths.bound * 100 > plan.totalMinor + 1) {
        throw new Error(`seed ${seed}: the plan costs ${plan.totalMinor}, below the bound of the paths`);
      }
    }
    return { planVesselMs: median(times), planVesselGap: worstGap };
  },
};

/** 100 vessels of 12 groups against berths and hours of 24 windows, in threads. */
export const planFirmRow: BenchRow = {
  values: [
    {
      name: 'planFirmS',
      what: 's to plan 100 vessels x 12 groups x 24 windows against the yard',
      better: 'lower',
      reach: FIRM_LIMIT_S,
      ambition: 30,
    },
    {
      name: 'planFirmGap',
      what: 'its gap to the proven lower bound',
      better: 'lower',
      reach: 0.03,
      ambition: 0.01,
    },
  ],
  async run() {
    const firm = inventedFirm({
      ...FROM,
      random: seededRandom(7),
      vesselCount: FIRM_VESSELS,
      hoursPerVessel: 17,
      berthsPerVessel: 0.16,
      lateDayCostMinor: 50_000,
    });
    const threads = new PlanningThreads(THREADS, {
      folder: join(__dirname, '../src/rerig-schedules'),
      ending: '.ts',
      // Neighbours on the machine are not what is measured.
      niceness: 0,
    });
    try {
      const began = performance.now();
      const plan = await threads.planFirm(firm, { timeLimitS: FIRM_LIMIT_S, targetGap: FIRM_GAP });
      const planFirmS = (performance.now() - began) / 1000;
      expectFits(firm, plan);
      return { planFirmS, planFirmGap: plan.proof.gap };
    } finally {
      await threads.close();
    }
  },
};

/** Adds up room, money and lateness anew, plainly. */
function expectFits(firm: FirmInput, plan: FirmPlan): void {
  for (const { id, riggerHours, berths } of firm.windows) {
    const visits = plan.vessels.flatMap((vessel) =>
      vessel.plan.visits.filter(({ windowId }) => windowId === id),
    );
    const hours = visits.reduce((sum, visit) => sum + visit.hours, 0);
    if (hours > (riggerHours ?? Infinity)) throw new Error(`window ${id}: ${hours} hours of ${riggerHours}`);
    for (const [kind, room] of Object.entries(berths ?? {})) {
      const used = visits.filter((visit) => visit.kind === kind).length;
      if (used > room) throw new Error(`window ${id}: ${used} berths of ${room} for ${kind}`);
    }
  }
  firm.vessels.forEach(({ input }, at) => {
    const model = vesselModel(input);
    const { visits } = plan.vessels[at].plan;
    const works = visits.flatMap(({ windowId, kind, tasks }) =>
      tasks.map(({ taskId }) => ({
        taskIndex: model.tasks.findIndex(({ task }) => task.id === taskId),
        window: model.windows.findIndex(({ window }) => window.id === windowId),
        kind,
      })),
    );
    const late = dutyOutcomes(model, { visits: [], works }).reduce((sum, { lateDays }) => sum + lateDays, 0);
    if (late > 0) throw new Error(`vessel ${at} is ${late} days late in a yard with room`);
  });
  const totalMinor = plan.vessels.reduce((sum, vessel) => sum + vessel.plan.totalMinor, 0);
  if (totalMinor < plan.proof.boundMinor) throw new Error('the plan costs less than its lower bound');
}

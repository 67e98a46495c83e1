import loadHighs from 'highs';
import { beforeAll, describe, expect, it } from 'vitest';
import type { FirmInput } from './firm-input.js';
import { roomLimits } from './firm-master.js';
import { firmVessel } from './firm-vessel.js';
import { highsSolver } from './highs-solver.js';
import { inventedFirm } from './invented-fleet.js';
import type { MixedIntegerProgram, ProgramSolver } from './mixed-integer-program.js';
import { NO_DECISIONS } from './plan-input.js';
import { planFirm } from './plan-firm.js';
import { ProgramBuilder } from './program-builder.js';
import { smallRandom } from './small-plans.js';
import { vesselModel } from './vessel-model.js';
import { vesselProgram } from './vessel-program.js';

let solver: ProgramSolver;
beforeAll(async () => {
  solver = highsSolver(await loadHighs());
});

const planned = (firm: FirmInput, timeLimitS = 60) => {
  // A clock that moves on by a twentieth of a second each time it is read: the same course in every run.
  let readings = 0;
  return planFirm(firm, {
    timeLimitS,
    targetGap: 0.001,
    elapsedS: () => 0.05 * readings++,
    askVessel: (request) => Promise.resolve(firmVessel(request, solver)),
    solver,
  });
};

function smallFirm(seed: number, hoursPerVessel: number): FirmInput {
  return inventedFirm({
    asOfOn: '2027-01-10',
    windowsFromOn: '2026-10-15',
    random: smallRandom(seed),
    taskCount: 4,
    windowCount: 8,
    vesselCount: 4,
    hoursPerVessel,
    berthsPerVessel: 0.25,
    lateDayCostMinor: 50_000,
  });
}

/** All vessels in one program by paths, late days at their cost: what decomposition is measured against. */
function oneProgram(firm: FirmInput): MixedIntegerProgram {
  const builder = new ProgramBuilder();
  const limits = roomLimits(firm.windows);
  const rows = limits.map((): [number, number][] => []);
  for (const { input } of firm.vessels) {
    const model = vesselModel(input);
    const built = vesselProgram(model, {
      formulation: 'arcs',
      minimise: 'cost',
      lateAllowed: true,
      lateDayCostMinor: firm.lateDayCostMinor,
    });
    const { program } = built;
    const first = builder.columnCount;
    const isWork = new Set(built.works.map(({ column }) => column));
    program.costs.forEach((cost, column) => {
      if (program.whole[column] === 1 || isWork.has(column)) builder.addChoice(cost);
      else builder.addAmount(cost, program.lowers[column], program.uppers[column]);
    });
    program.rowLowers.forEach((lower, row) => {
      const entries: [number, number][] = [];
      for (let at = program.rowStarts[row]; at < program.rowStarts[row + 1]; at++) {
        entries.push([first + program.columnIndices[at], program.coefficients[at]]);
      }
      builder.addRow(lower, program.rowUppers[row], entries);
    });
    limits.forEach(({ windowId, kind }, at) => {
      for (const visit of built.visits) {
        const window = model.windows[visit.window];
        if (window.window.id !== windowId || (kind !== null && kind !== visit.kind)) continue;
        const { hours } = window.offers.find((offer) => offer.kind === visit.kind)!;
        rows[at].push([first + visit.column, kind === null ? hours : 1]);
      }
      for (const work of kind === null ? built.works : []) {
        if (model.windows[work.window].window.id !== windowId) continue;
        const { hours } = model.tasks[work.taskIndex].work.find((offered) => offered.kind === work.kind)!;
        rows[at].push([first + work.column, hours]);
      }
    });
  }
  limits.forEach(({ limit }, at) => builder.addRow(-Infinity, limit, rows[at]));
  return builder.build();
}

describe('a firm against its yard', () => {
  it.each([
    ['ample', 40, [1, 2, 3, 4]],
    ['scarce', 16, [5, 6, 7, 8]],
    ['too little', 6, [9, 10]],
  ])(
    'bound <= optimum of one program <= plan, with %s room',
    async (_, hoursPerVessel, seeds) => {
      for (const seed of seeds) {
        const firm = smallFirm(seed, hoursPerVessel);
        const plan = await planned(firm);
        const best = solver.solve(oneProgram(firm), { timeLimitS: 60, relativeGap: 0 });
        expect(best.status).toBe('solved');
        const weight = plan.totalMinor + plan.lateDays * firm.lateDayCostMinor;
        const unavoidableMinor = weight - plan.proof.weightMinor;
        expect(weight, `seed ${seed}`).toBeGreaterThanOrEqual(best.objective * 100 - 1);
        // The bound for plans in time says nothing about a cheaper late plan; here lateness never pays.
        expect(plan.proof.boundMinor + unavoidableMinor, `seed ${seed}`).toBeLessThanOrEqual(
          best.objective * 100 + 1,
        );
        expect(plan.windows.filter(({ isOverfull }) => isOverfull)).toEqual([]);
        expect(plan.proof.gap).toBeGreaterThanOrEqual(0);
      }
    },
    120_000,
  );

  // Two vessels, each with one task due in June 2028 and two windows before it; the yard has one berth. Alone, both would
  // take the cheaper window a (1,000 + 500, with contingency 1,800); together one has to take b at 1,200 + 500, 2,040.
  it('gives the berth to one of two vessels and counts what that costs', async () => {
    const input = {
      asOfOn: '2028-01-10',
      horizonEndOn: '2029-06-30',
      currency: 'EUR',
      visitTerms: { 'mast-out-afloat': { costMinor: 100_000, hours: 10 } },
      contingencyShare: 0.2,
      orderMarginDays: 14,
      windows: [
        { id: 'a', opensOn: '2028-02-01', closesOn: '2028-03-01', kinds: ['mast-out-afloat' as const] },
        {
          id: 'b',
          opensOn: '2028-04-01',
          closesOn: '2028-05-01',
          kinds: ['mast-out-afloat' as const],
          visitCostMinor: { 'mast-out-afloat': 120_000 },
        },
      ],
      tasks: [
        {
          id: 'stay',
          name: 'forestay',
          partIds: ['fs'],
          action: 'replace' as const,
          ground: 'replace-by' as const,
          dueOn: '2028-06-01',
          againAfterDays: 3652,
          terms: { 'mast-out-afloat': { costMinor: 50_000, hours: 8 } },
          leadDays: 0,
          alsoDoneBy: [],
          needs: [],
        },
      ],
      decisions: NO_DECISIONS,
    };
    const firm: FirmInput = {
      lateDayCostMinor: 50_000,
      windows: ['a', 'b'].map((id) => ({ id, riggerHours: 100, berths: { 'mast-out-afloat': 1 } })),
      vessels: ['one', 'two'].map((vesselId) => ({ vesselId, name: vesselId, input })),
    };
    const plan = await planned(firm);
    expect(plan.totalMinor).toBe(180_000 + 204_000);
    expect(plan.lateDays).toBe(0);
    expect(plan.windows.map(({ visits }) => visits.length)).toEqual([1, 1]);
    // Prices are taken as found within the gap asked for.
    expect(plan.proof.gap).toBeLessThanOrEqual(0.001);
    expect(plan.proof.boundMinor).toBeLessThanOrEqual(384_000);

    // Without window b one of them has to be late, or undone: 1 June 2028 to 30 June 2029 is 394 days.
    const short = await planned({ ...firm, windows: [firm.windows[0], { id: 'b', riggerHours: 5 }] });
    expect(short.lateDays).toBe(394);
    expect(short.proof.lateCounted).toBe(true);
    expect(short.vessels.flatMap((vessel) => vessel.plan.lateTasks.map(({ reason }) => reason))).toEqual([
      'gives-way',
    ]);
  });

  it('refuses a vessel it cannot plan, by name', async () => {
    const firm = smallFirm(1, 40);
    const [vessel, ...others] = firm.vessels;
    const bad = { ...vessel, input: { ...vessel.input, contingencyShare: 3 } };
    await expect(planned({ ...firm, vessels: [bad, ...others] })).rejects.toThrow(
      /^Vessel 0: The contingency/,
    );
  });
});

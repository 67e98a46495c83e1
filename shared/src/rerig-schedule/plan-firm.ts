import type { FirmInput } from './firm-input.js';
import {
  firmMaster,
  lastResortMinor,
  pricesPerWindow,
  roomLimits,
  roomPerWindow,
  useOf,
  weightMinor,
} from './firm-master.js';
import type { FirmMaster, MasterColumn, RoomLimit } from './firm-master.js';
import type { FirmPlan } from './firm-plan.js';
import type { FirmVesselAnswer, FirmVesselRequest, FirmVesselSolver } from './firm-vessel.js';
import { lateTasksOf } from './late-tasks.js';
import type { ProgramSolver } from './mixed-integer-program.js';
import { NO_DECISIONS, VISIT_KINDS } from './plan-input.js';
import type { PlanInput } from './plan-input.js';
import { CONTRADICTION } from './plan-vessel.js';
import { planProblems } from './plan-problems.js';
import { readPlan } from './read-plan.js';
import { relaxedPrices } from './relaxed-prices.js';
import { vesselModel } from './vessel-model.js';
import type { VesselOption } from './vessel-option.js';
import { MINOR_PER_PROGRAM_UNIT } from './vessel-program.js';

/** When the planning of a firm may stop, and whom it asks. */
export interface FirmSettings {
  /** Whole time, seconds. */
  timeLimitS: number;
  /** Gap between plan and proven bound at which to stop. */
  targetGap: number;
  /** Seconds since the planning began; the caller's clock. */
  elapsedS: () => number;
  /** Answers questions about single vessels, as many at a time as it likes. */
  askVessel: FirmVesselSolver;
  /** Solves the master programs. */
  solver: ProgramSolver;
  onProgress?: (progress: { round: number; boundMinor: number }) => void;
}

/** Gap to which each vessel is solved, and at which prices are good enough: a share of the gap of the whole. */
const VESSEL_GAP = 0.002;
const REFIT_GAP = 0.005;
const VESSEL_LIMIT_S = 10;
/** Shares of the time left for prices on relaxed programs, for rounds of whole plans, and for picking among them. */
const RELAXED_SHARE = 0.4;
const WHOLE_SHARE = 0.5;
const PICKING_SHARE = 0.25;
const LEAST_PICKING_S = 5;
/** Times to look for more plans where those picked do not fit. */
const PICK_ATTEMPTS = 8;
/** Parts past their dates are worse than a planning that takes longer: so many times the whole time may go there. */
const OVERTIME = 1.5;
/** Rounds of whole plans; each adds one plan per vessel to pick from. */
const WHOLE_ROUNDS = 8;
/** How far each of them moves from the prices of the best bound so far toward the master's. */
const PRICE_STEP = 0.5;
/** Vessels tried in a window that is too full. */
const FIT_CANDIDATES = 8;
const SAME = 1e-9;

/**
 * Plans all vessels of a firm against the berths and rigger hours of its yard.
 *
 * Decomposition by vessel (Dantzig and Wolfe, 1960; bound after Lagrange): a berth and an hour get a price per window;
 * each vessel answers with its cheapest plan at these prices; a master program over the plans found so far picks a mix and
 * new prices. At any prices, the sum of the vessels' proven bounds less the worth of the yard's room is a bound for the
 * whole. At the end one plan per vessel is picked whole, vessels that do not fit are planned anew within the room the
 * others leave, and so are others while there is time and something to gain.
 *
 * Where the yard has too little room for every vessel to be in time, plans may run late at a cost per day, and the bound
 * counts those days at the same cost.
 *
 * @throws RangeError where the input of a vessel cannot be planned, naming the vessel
 */
export async function planFirm(firm: FirmInput, settings: FirmSettings): Promise<FirmPlan> {
  const problems = firmProblems(firm);
  if (problems.length > 0) throw new RangeError(problems.join(' '));
  const run = new FirmRun(firm, settings);
  await run.begin();
  const isShort = await run.findOptions(false);
  let picked = isShort ? null : await run.pickAndFit(false);
  if (picked === null) {
    // Not every vessel can be in time: days late are weighed against money, and the bound is found anew.
    await run.findOptions(true);
    picked = await run.pickAndFit(true);
  }
  return run.report(picked!);
}

function firmProblems(firm: FirmInput): string[] {
  const ids = firm.windows.map(({ id }) => id);
  return [
    ...firm.vessels.flatMap(({ name, input }) => planProblems(input).map((words) => `${name}: ${words}`)),
    ...ids.filter((id, at) => ids.indexOf(id) !== at).map((id) => `Window ${id} of the yard is given twice.`),
    ...firm.windows
      .filter(({ riggerHours, berths }) =>
        [riggerHours, ...Object.values(berths ?? {})].some((room) => room !== undefined && !(room >= 0)),
      )
      .map(({ id }) => `Window ${id} of the yard: hours and berths must be 0 or more.`),
    ...(firm.lateDayCostMinor > 0 ? [] : ['A day late must weigh more than nothing.']),
    ...(new Set(firm.vessels.map(({ input }) => input.currency)).size > 1
      ? ['All vessels of a firm are planned in one currency.']
      : []),
  ];
}

class FirmRun {
  readonly #limits: RoomLimit[];
  readonly #options: VesselOption[][];
  readonly #withoutDecisions: boolean[];
  readonly #givesWay: boolean[];
  readonly #remarks: string[][];
  readonly #beyondMinor: number;
  #prices: number[];
  #boundMinor = -Infinity;
  #rounds = 0;
  #lateMode = false;
  #isShort = false;

  constructor(
    private readonly firm: FirmInput,
    private readonly settings: FirmSettings,
  ) {
    this.#limits = roomLimits(firm.windows);
    this.#options = firm.vessels.map(() => []);
    this.#withoutDecisions = firm.vessels.map(() => false);
    this.#givesWay = firm.vessels.map(() => false);
    this.#remarks = firm.vessels.map(() => []);
    this.#prices = this.#limits.map(() => 0);
    this.#beyondMinor = lastResortMinor(firm);
  }

  /** Every vessel's cheapest plan as if it were alone: the sum is the first bound. */
  async begin(): Promise<void> {
    const answers = await this.#askAll(this.#prices, false);
    answers.forEach(({ option, withoutDecisions, hasToGiveWay, impossible }, vessel) => {
      this.#remarks[vessel] = withoutDecisions ? [CONTRADICTION] : impossible;
      this.#withoutDecisions[vessel] = withoutDecisions;
      this.#givesWay[vessel] = hasToGiveWay;
      this.#keep(vessel, option);
    });
    this.#advance(this.#boundAt(this.#prices, answers));
  }

  /**
   * Finds prices on the relaxed programs, then whole plans at and around them.
   *
   * @returns true where the yard is short of room: even split plans cannot all be in time
   */
  async findOptions(lateMode: boolean): Promise<boolean> {
    const { settings } = this;
    if (lateMode) {
      // A bound for plans in time says nothing about plans that may be late.
      this.#boundMinor = -Infinity;
      this.#lateMode = true;
    }
    const relaxed = relaxedPrices(
      this.firm,
      this.firm.vessels.map((_, vessel) => ({
        input: this.#inputOf(vessel),
        lateAllowed: lateMode || this.#givesWay[vessel],
      })),
      this.#limits,
      settings.solver,
      { elapsedS: settings.elapsedS, untilS: this.#until(RELAXED_SHARE), gap: VESSEL_GAP / 2 },
    );
    this.#rounds += relaxed.rounds;
    this.#advance(relaxed.boundMinor);
    this.#prices = relaxed.pricesMinor;
    // Whole plans in time are of use where there is room for them, and late ones where there is not. Where only a plan here
    // and there did not fit, those found in time are the better start for plans that may be late.
    const isFirstAttempt = !lateMode;
    if (isFirstAttempt) this.#isShort = relaxed.isShort;
    if (isFirstAttempt !== this.#isShort) await this.#findWholeOptions(relaxed.pricesMinor, lateMode);
    return this.#isShort;
  }

  async #findWholeOptions(pricesMinor: number[], lateMode: boolean): Promise<void> {
    const { settings } = this;
    const untilS = this.#until(WHOLE_SHARE);
    let best = pricesMinor;
    let bestMinor = -Infinity;
    let asked = best;
    for (let round = 0; round < WHOLE_ROUNDS; round++) {
      const beganS = settings.elapsedS();
      const answers = await this.#askAll(asked, lateMode);
      const boundMinor = this.#boundAt(asked, answers);
      if (boundMinor > bestMinor) {
        bestMinor = boundMinor;
        best = asked;
      }
      this.#advance(boundMinor);
      const isNew = answers.map(({ option }, vessel) => this.#keep(vessel, option)).includes(true);
      const { program, rows } = this.#master(false);
      const mix = settings.solver.solve(program, { timeLimitS: VESSEL_LIMIT_S, relativeGap: 0 });
      if (mix.rowDuals === null) break;
      const isGood =
        mix.objective * MINOR_PER_PROGRAM_UNIT - this.#boundMinor <=
        (settings.targetGap / 4) * Math.abs(this.#boundMinor);
      const nowS = settings.elapsedS();
      if (isGood || !isNew || 2 * nowS - beganS >= untilS) break;
      const wanted = rows.map((row) => Math.max(0, -mix.rowDuals![row] * MINOR_PER_PROGRAM_UNIT));
      asked = wanted.map(
        (price, at) => best[at] + PRICE_STEP * (Math.min(price, 4 * best[at] + 1) - best[at]),
      );
    }
    this.#prices = best;
  }

  /** One option per vessel within the yard's room; null where that takes running later than must be. */
  async pickAndFit(lateMode: boolean): Promise<VesselOption[] | null> {
    let picked = this.#pick();
    let raised = this.#prices;
    for (let attempt = 1; !(await this.#fitAll(picked, lateMode)); attempt++) {
      const isOver = this.settings.elapsedS() >= OVERTIME * this.settings.timeLimitS;
      if (lateMode) break;
      if (attempt > PICK_ATTEMPTS || isOver) return null;
      // Where plans still pass a limit, its price goes up, vessels that use it are asked for plans that keep out of it,
      // and the pick is made anew among more plans.
      const left = this.#leftBy(picked);
      raised = raised.map((price, at) =>
        left[at] < -SAME
          ? 2 * price + (attempt * this.#beyondMinor) / (1000 * this.#limits[at].limit + 1)
          : price,
      );
      const prices = pricesPerWindow(this.#limits, raised);
      await Promise.all(
        picked.map(async (option, vessel) => {
          if (!this.#limits.some((limit, at) => left[at] < -SAME && useOf(option, limit) > 0)) return;
          const answer = await this.#ask(vessel, { prices, lateAllowed: false });
          if (answer !== null) this.#keep(vessel, answer.option);
        }),
      );
      picked = this.#pick();
    }
    await this.#improve(picked, lateMode);
    return picked;
  }

  #pick(): VesselOption[] {
    const columns = this.#columns();
    const solved = this.settings.solver.solve(this.#master(true).program, {
      timeLimitS: Math.max(LEAST_PICKING_S, this.#until(PICKING_SHARE) - this.settings.elapsedS()),
      relativeGap: VESSEL_GAP,
    });
    const picked = this.#options.map(([first]) => first);
    columns.forEach(({ vessel, option }, column) => {
      if ((solved.values?.[column] ?? 0) > 0.5) picked[vessel] = option;
    });
    return picked;
  }

  report(picked: VesselOption[]): FirmPlan {
    const { firm } = this;
    const totalMinor = sum(picked.map(({ costMinor }) => costMinor));
    const weight = sum(picked.map((option) => weightMinor(option, firm)));
    const vessels = firm.vessels.map(({ vesselId, name }, vessel) => {
      const model = vesselModel(this.#inputOf(vessel));
      const { choice } = picked[vessel];
      const remarks = this.#remarks[vessel];
      return {
        vesselId,
        name,
        plan: readPlan(model, choice, lateTasksOf(model, choice), remarks),
      };
    });
    const boundMinor = Math.min(weight, this.#boundMinor);
    const unavoidableMinor = this.#unavoidableMinor();
    const gap = weight - unavoidableMinor <= 0 ? 0 : (weight - boundMinor) / (weight - unavoidableMinor);
    return {
      vessels,
      totalMinor,
      lateDays: sum(picked.map(({ lateDays }) => lateDays)),
      proof: {
        ended: gap <= this.settings.targetGap ? 'within-gap' : 'time-limit',
        weightMinor: weight - unavoidableMinor,
        boundMinor: boundMinor - unavoidableMinor,
        gap,
        lateCounted: this.#lateMode,
        rounds: this.#rounds,
      },
      windows: this.#windowsOf(picked),
    };
  }

  async #askAll(prices: readonly number[], lateAllowed: boolean): Promise<FirmVesselAnswer[]> {
    const perWindow = pricesPerWindow(this.#limits, prices);
    return Promise.all(
      this.firm.vessels.map(async (_, vessel) => {
        const answer = await this.#ask(vessel, { prices: perWindow, lateAllowed });
        if (answer === null)
          throw new Error(`${this.firm.vessels[vessel].name}: no plan exists, not even a late one.`);
        return answer;
      }),
    );
  }

  async #ask(
    vessel: number,
    question: Pick<FirmVesselRequest, 'prices' | 'room' | 'lateAllowed'>,
  ): Promise<FirmVesselAnswer | null> {
    return this.settings.askVessel({
      ...question,
      lateAllowed: question.lateAllowed || this.#givesWay[vessel],
      input: this.#inputOf(vessel),
      lateDayCostMinor: this.firm.lateDayCostMinor,
      limits: {
        timeLimitS: VESSEL_LIMIT_S,
        relativeGap: question.room === undefined ? VESSEL_GAP : REFIT_GAP,
      },
    });
  }

  #boundAt(prices: readonly number[], answers: readonly FirmVesselAnswer[]): number {
    const worth = sum(this.#limits.map(({ limit }, at) => limit * prices[at]));
    return sum(answers.map(({ boundMinor }) => boundMinor)) - worth;
  }

  /** Adds an option unless the vessel has one that weighs and uses the same. */
  #keep(vessel: number, option: VesselOption): boolean {
    const keyOf = ({ costMinor, lateDays, uses }: VesselOption): string =>
      JSON.stringify([costMinor, lateDays, uses]);
    const key = keyOf(option);
    if (this.#options[vessel].some((known) => keyOf(known) === key)) return false;
    this.#options[vessel].push(option);
    return true;
  }

  #columns(): (MasterColumn & { option: VesselOption })[] {
    return this.#options.flatMap((options, vessel) =>
      options.map((option) => ({
        vessel,
        option,
        weightMinor: weightMinor(option, this.firm),
        uses: this.#limits.map((limit) => useOf(option, limit)),
      })),
    );
  }

  #master(whole: boolean): FirmMaster {
    return firmMaster(this.#limits, this.firm.vessels.length, this.#columns(), this.#beyondMinor, whole);
  }

  #inputOf(vessel: number): PlanInput {
    const { input } = this.firm.vessels[vessel];
    return this.#withoutDecisions[vessel] ? { ...input, decisions: NO_DECISIONS } : input;
  }

  #advance(boundMinor: number): void {
    this.#rounds += 1;
    this.#boundMinor = Math.max(this.#boundMinor, boundMinor);
    this.settings.onProgress?.({ round: this.#rounds, boundMinor: this.#boundMinor });
  }

  /** Moment at which a share of the time left will be over. */
  #until(share: number): number {
    const now = this.settings.elapsedS();
    return now + share * Math.max(0, this.settings.timeLimitS - now);
  }

  /** Plans vessels anew within the room the others leave until no limit is passed. */
  async #fitAll(picked: VesselOption[], lateAllowed: boolean): Promise<boolean> {
    for (;;) {
      const left = this.#leftBy(picked);
      const passed = this.#limits.findIndex((_, at) => left[at] < -SAME);
      if (passed < 0) return true;
      const limit = this.#limits[passed];
      // Vessels whose leaving would be just enough come first; trying every one of a full window would take too long.
      const candidates = picked
        .map((option, vessel) => ({ vessel, spare: useOf(option, limit) + left[passed] }))
        .filter(({ vessel }) => useOf(picked[vessel], limit) > 0)
        .sort(
          (one, other) =>
            Number(one.spare < 0) - Number(other.spare < 0) || Math.abs(one.spare) - Math.abs(other.spare),
        )
        .slice(0, FIT_CANDIDATES)
        .map(({ vessel }) => vessel);
      const fits = await Promise.all(
        candidates.map(async (vessel) => ({
          vessel,
          answer: await this.#refit(picked, vessel, lateAllowed),
        })),
      );
      let best: { vessel: number; option: VesselOption; more: number } | null = null;
      for (const { vessel, answer } of fits) {
        if (answer === null || useOf(answer.option, limit) >= useOf(picked[vessel], limit)) continue;
        const more = weightMinor(answer.option, this.firm) - weightMinor(picked[vessel], this.firm);
        if (best === null || more < best.more) best = { vessel, option: answer.option, more };
      }
      if (best === null) return false;
      picked[best.vessel] = best.option;
      this.#keep(best.vessel, best.option);
    }
  }

  /** One vessel after the other is planned anew within the room the others leave, while that gains and time is left. */
  async #improve(picked: VesselOption[], lateAllowed: boolean): Promise<void> {
    const { settings, firm } = this;
    const isGood = (): boolean => {
      const weight = sum(picked.map((option) => weightMinor(option, firm)));
      return weight - this.#boundMinor <= settings.targetGap * (weight - this.#unavoidableMinor());
    };
    for (let gained = true; gained;) {
      gained = false;
      // Vessels that pay most above their cheapest option have most to gain.
      const order = picked
        .map((option, vessel) => {
          const cheapest = Math.min(...this.#options[vessel].map((known) => weightMinor(known, firm)));
          return { vessel, above: weightMinor(option, firm) - cheapest };
        })
        .filter(({ above }) => above > 0)
        .sort((one, other) => other.above - one.above);
      for (const { vessel } of order) {
        if (isGood() || settings.elapsedS() >= settings.timeLimitS) return;
        const answer = await this.#refit(picked, vessel, lateAllowed);
        if (answer === null || weightMinor(answer.option, firm) >= weightMinor(picked[vessel], firm))
          continue;
        picked[vessel] = answer.option;
        gained = true;
      }
    }
  }

  #refit(
    picked: readonly VesselOption[],
    vessel: number,
    lateAllowed: boolean,
  ): Promise<FirmVesselAnswer | null> {
    const left = this.#leftBy(picked);
    const withOwn = this.#limits.map((limit, at) => left[at] + useOf(picked[vessel], limit));
    return this.#ask(vessel, { room: roomPerWindow(this.#limits, withOwn), lateAllowed });
  }

  #leftBy(picked: readonly VesselOption[]): number[] {
    return this.#limits.map((limit) => limit.limit - sum(picked.map((option) => useOf(option, limit))));
  }

  /** What the days weigh that no plan of a vessel avoids: the same in every plan, so no part of the gap. */
  #unavoidableMinor(): number {
    return sum(
      this.#options.map(
        (options) => Math.min(...options.map(({ lateDays }) => lateDays)) * this.firm.lateDayCostMinor,
      ),
    );
  }

  #windowsOf(picked: readonly VesselOption[]): FirmPlan['windows'] {
    return this.firm.windows.map(({ id, riggerHours, berths }) => {
      const visits = picked.flatMap((option, vessel) => {
        const use = option.uses.find(({ windowId }) => windowId === id);
        return use === undefined
          ? []
          : [{ vesselId: this.firm.vessels[vessel].vesselId, kind: use.kind, hours: use.hours }];
      });
      const priceOf = (kind: RoomLimit['kind']): number => {
        const at = this.#limits.findIndex((limit) => limit.windowId === id && limit.kind === kind);
        return at < 0 ? 0 : Math.round(this.#prices[at]);
      };
      const hours = sum(visits.map((visit) => visit.hours));
      return {
        windowId: id,
        visits,
        hours,
        hoursRoom: riggerHours ?? null,
        hourPriceMinor: priceOf(null),
        berths: VISIT_KINDS.map((kind) => ({
          kind,
          used: visits.filter((visit) => visit.kind === kind).length,
          room: berths?.[kind] ?? null,
          priceMinor: priceOf(kind),
        })),
        isOverfull:
          (riggerHours !== undefined && hours > riggerHours + SAME) ||
          VISIT_KINDS.some(
            (kind) => visits.filter((visit) => visit.kind === kind).length > (berths?.[kind] ?? Infinity),
          ),
      };
    });
  }
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}

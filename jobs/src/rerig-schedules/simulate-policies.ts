import { addMonths, dayNumber, dayOfNumber } from '@stayledger/shared/fatigue/life/days';
import { inventedVessel } from '@stayledger/shared/rerig-schedule/invented-fleet';
import type { PlanInput, PlanTask, VisitKind } from '@stayledger/shared/rerig-schedule/plan-input';
import { contingencyOf } from '@stayledger/shared/rerig-schedule/vessel-model';
import type { VesselPlan } from '@stayledger/shared/rerig-schedule/vessel-plan';
import type { SeededRandom } from '../demo/seeded-random.js';

/** How it is decided when parts are replaced. */
export const POLICIES = [
  'the plan, made anew each year',
  'everything every 10 years',
  'each part when due',
] as const;
export type Policy = (typeof POLICIES)[number];

/** What a policy came to on one vessel. */
export interface PolicyOutcome {
  costMinor: number;
  visits: number;
  mastOutVisits: number;
  replaced: number;
  /** Fitted parts that ran past their date at any time, and the days they did, added up. */
  partsPast: number;
  daysPast: number;
}

/** An invented vessel with the seasons it will sail, the same under every policy. */
export interface SimulatedVessel {
  input: PlanInput;
  /** Use of the allowance in each half-year, 1 = as forecast. */
  useOfHalfYears: number[];
  /** Share of its allowance and age in days of each part at the beginning. */
  parts: { usedShare: number; ageDays: number }[];
}

interface FittedPart {
  task: PlanTask;
  usedShare: number;
  ageDays: number;
  isPast: boolean;
}

const FROM_ON = '2026-10-15';
export const SIMULATED_YEARS = 30;
const HALF_YEARS = 2 * SIMULATED_YEARS;
const HALF_YEAR_DAYS = 365.25 / 2;
const PLANNED_HALF_YEARS = 24;
const PART_COUNT = 14;
/** Renewal that the trade recommends whatever the use (rules of thumb of the trade). */
const CALENDAR_DAYS = Math.round(15 * 365.25);
/** Season to season; an engineering choice without a source. */
const SEASON_COV = 0.3;
const TEN_YEARS_DAYS = Math.round(10 * 365.25);

/** Draws a vessel: parts, prices, age of its rig and the use of every season to come. */
export function drawVessel(random: SeededRandom): SimulatedVessel {
  const drawn = inventedVessel({
    asOfOn: FROM_ON,
    windowsFromOn: FROM_ON,
    random: () => random.uniform(),
    taskCount: PART_COUNT,
    windowCount: HALF_YEARS + PLANNED_HALF_YEARS,
  });
  const tasks = drawn.tasks
    .filter(({ action }) => action === 'replace')
    // Material is ordered ahead under every policy.
    .map((task): PlanTask => ({ ...task, leadDays: 0 }));
  const rigDays = random.between(0, TEN_YEARS_DAYS);
  const sigma = Math.sqrt(Math.log(1 + SEASON_COV ** 2));
  const seasons = Array.from({ length: SIMULATED_YEARS }, () =>
    Math.exp(sigma * random.normal() - sigma ** 2 / 2),
  );
  return {
    input: { ...drawn, tasks },
    useOfHalfYears: seasons.flatMap((use) => [use, use]),
    parts: tasks.map(({ againAfterDays }) => ({
      // Whatever would have been over already has been replaced once.
      usedShare: (rigDays % (0.95 * againAfterDays!)) / againAfterDays!,
      ageDays: Math.round(rigDays % (0.95 * againAfterDays!)),
    })),
  };
}

/**
 * Thirty years of one vessel under one policy, half-year by half-year. Dates are forecast from what has been used so far
 * at average use; the seasons then turn out as drawn. Inspections are left out: they are the same under every policy.
 *
 * @param planOf plans a vessel; asked each autumn under the plan's policy only
 */
export async function simulateVessel(
  vessel: SimulatedVessel,
  policy: Policy,
  planOf: (input: PlanInput) => Promise<VesselPlan>,
): Promise<PolicyOutcome> {
  const outcome: PolicyOutcome = {
    costMinor: 0,
    visits: 0,
    mastOutVisits: 0,
    replaced: 0,
    partsPast: 0,
    daysPast: 0,
  };
  const parts = vessel.parts.map((part, at): FittedPart => ({
    ...part,
    task: vessel.input.tasks[at],
    isPast: false,
  }));
  let planned: VesselPlan | null = null;
  for (let half = 0; half < HALF_YEARS; half++) {
    if (policy === POLICIES[0] && half % 2 === 0) planned = await planOf(inputAt(vessel, parts, half));
    const visit = visitAt(vessel, parts, policy, half, planned);
    if (visit !== null) takeVisit(vessel, visit, outcome);
    for (const part of parts) sail(part, vessel.useOfHalfYears[half], outcome);
  }
  return outcome;
}

function onOf(half: number): string {
  return addMonths(FROM_ON, 6 * half);
}

function dueDays({ task, usedShare, ageDays }: FittedPart): number {
  const byUse = (1 - usedShare) * task.againAfterDays!;
  return Math.floor(Math.min(byUse, CALENDAR_DAYS - ageDays));
}

function inputAt(vessel: SimulatedVessel, parts: readonly FittedPart[], half: number): PlanInput {
  const asOfOn = onOf(half);
  return {
    ...vessel.input,
    asOfOn,
    horizonEndOn: onOf(half + PLANNED_HALF_YEARS),
    windows: vessel.input.windows.slice(half, half + PLANNED_HALF_YEARS),
    tasks: parts.map((part) => ({
      ...part.task,
      dueOn: dayOfNumber(dayNumber(asOfOn) + dueDays(part)),
      againAfterDays: Math.min(part.task.againAfterDays!, CALENDAR_DAYS),
    })),
  };
}

interface Visit {
  kind: VisitKind;
  parts: FittedPart[];
}

function visitAt(
  vessel: SimulatedVessel,
  parts: FittedPart[],
  policy: Policy,
  half: number,
  planned: VesselPlan | null,
): Visit | null {
  switch (policy) {
    case 'the plan, made anew each year': {
      const windowId = vessel.input.windows[half].id;
      const visit = planned?.visits.find((candidate) => candidate.windowId === windowId);
      if (visit === undefined) return null;
      const ids = new Set(visit.tasks.map(({ taskId }) => taskId));
      return { kind: visit.kind, parts: parts.filter(({ task }) => ids.has(task.id)) };
    }
    case 'everything every 10 years': {
      // Whole rigs are changed in the winter, ashore, when the oldest part has reached its ten years.
      const isDue = Math.max(...parts.map(({ ageDays }) => ageDays)) >= TEN_YEARS_DAYS - HALF_YEAR_DAYS;
      return isDue && half % 2 === 0 ? { kind: 'mast-out-ashore', parts } : null;
    }
    case 'each part when due': {
      // The mast can come out in either window of the year, so every part can wait for the last one before its date.
      const due = parts.filter((part) => dueDays(part) < HALF_YEAR_DAYS);
      if (due.length === 0) return null;
      const isAloft = due.every(({ task }) => task.terms.aloft !== undefined);
      return { kind: isAloft ? 'aloft' : 'mast-out-afloat', parts: due };
    }
  }
}

function takeVisit({ input }: SimulatedVessel, { kind, parts }: Visit, outcome: PolicyOutcome): void {
  const withContingency = (costMinor: number): number =>
    costMinor + contingencyOf(costMinor, kind, input.contingencyShare);
  outcome.costMinor += withContingency(input.visitTerms[kind]!.costMinor);
  outcome.visits += 1;
  if (kind !== 'aloft') outcome.mastOutVisits += 1;
  for (const part of parts) {
    outcome.costMinor += withContingency(part.task.terms[kind]!.costMinor);
    outcome.replaced += 1;
    part.usedShare = 0;
    part.ageDays = 0;
    part.isPast = false;
  }
}

/** Half a year of sailing: what it uses, and the days of it that lie past the part's date. */
function sail(part: FittedPart, use: number, outcome: PolicyOutcome): void {
  const usedPerDay = use / part.task.againAfterDays!;
  const untilUsed = Math.max(0, (1 - part.usedShare) / usedPerDay);
  const untilOld = Math.max(0, CALENDAR_DAYS - part.ageDays);
  const daysPast = Math.max(0, HALF_YEAR_DAYS - Math.min(untilUsed, untilOld));
  if (daysPast > 0 && !part.isPast) {
    part.isPast = true;
    outcome.partsPast += 1;
  }
  outcome.daysPast += daysPast;
  part.usedShare += usedPerDay * HALF_YEAR_DAYS;
  part.ageDays += HALF_YEAR_DAYS;
}

import { dayNumber, dayOfNumber } from '../fatigue/life/days.js';
import { NO_DECISIONS, VISIT_KINDS } from './plan-input.js';
import type { PlanDecisions, PlanInput, PlanTask, PlanWindow, VisitKind } from './plan-input.js';

/** A small generator of even chance from 0 to 1 (mulberry32; from memory), for invented cases. */
export function smallRandom(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
}

/**
 * An invented case small enough to be solved by trying everything: up to 8 windows and 5 tasks, unevenly spaced, some
 * overdue, some that hardly any window allows.
 *
 * @param random the only source of chance
 * @param size most windows and tasks, whether tasks may ask for one another, and whether something is settled by hand
 */
export function smallPlan(
  random: () => number,
  size: { windows: number; tasks: number; coupled: boolean; settled?: boolean },
): PlanInput {
  const whole = (least: number, most: number): number => least + Math.floor(random() * (most - least + 1));
  const asOf = dayNumber('2027-03-01');
  const someKinds = (share: number): VisitKind[] => VISIT_KINDS.filter(() => random() < share);
  let day = asOf + whole(-40, 120);
  const windows = Array.from({ length: whole(1, size.windows) }, (_, at): PlanWindow => {
    const opensOn = dayOfNumber(day);
    const closesOn = dayOfNumber(day + whole(10, 90));
    day += whole(100, 300);
    return { id: `w${at}`, opensOn, closesOn, kinds: someKinds(0.6) };
  });
  const taskCount = whole(1, size.tasks);
  const tasks = Array.from({ length: taskCount }, (_, at): PlanTask => {
    const kinds = someKinds(0.65);
    const others = Array.from({ length: taskCount }, (_, other) => other).filter((other) => other !== at);
    const some = (share: number): string[] =>
      size.coupled ? others.filter(() => random() < share).map((other) => `t${other}`) : [];
    return {
      id: `t${at}`,
      name: `task ${at}`,
      partIds: [`p${at}`],
      action: 'replace',
      ground: 'replace-by',
      dueOn: random() < 0.08 ? null : dayOfNumber(asOf + whole(-60, 1200)),
      againAfterDays: random() < 0.15 ? null : whole(200, 1500),
      terms: Object.fromEntries(
        kinds.map((kind) => [kind, { costMinor: whole(0, 90) * 1000, hours: whole(1, 20) }]),
      ),
      leadDays: random() < 0.5 ? 0 : whole(1, 60),
      alsoDoneBy: some(0.25),
      needs: some(0.2),
    };
  });
  return {
    asOfOn: dayOfNumber(asOf),
    horizonEndOn: dayOfNumber(asOf + whole(900, 1900)),
    currency: 'EUR',
    visitTerms: {
      aloft: { costMinor: whole(1, 60) * 1000, hours: 3 },
      'mast-out-afloat': { costMinor: whole(60, 200) * 1000, hours: 12 },
      'mast-out-ashore': { costMinor: whole(80, 260) * 1000, hours: 16 },
    },
    contingencyShare: 0.2,
    orderMarginDays: 14,
    windows,
    tasks,
    decisions: size.settled === true ? someDecisions(random, windows, tasks) : NO_DECISIONS,
  };
}

function someDecisions(
  random: () => number,
  windows: readonly PlanWindow[],
  tasks: readonly PlanTask[],
): PlanDecisions {
  const some = (share: number): PlanWindow[] => windows.filter(() => random() < share);
  return {
    locked: some(0.2).map(({ id }) => ({ windowId: id, kind: VISIT_KINDS[Math.floor(3 * random())] })),
    barred: some(0.2).map(({ id }) =>
      random() < 0.5 ? { windowId: id } : { windowId: id, kind: VISIT_KINDS[Math.floor(3 * random())] },
    ),
    pinned: [],
    kept: tasks.flatMap(({ id }) => some(0.15).map((window) => ({ taskId: id, windowId: window.id }))),
  };
}

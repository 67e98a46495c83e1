import { dayNumber } from '../fatigue/life/days.js';
import { VISIT_KINDS } from './plan-input.js';
import type { PlanInput, WorkTerms } from './plan-input.js';

/**
 * What is wrong with a plan's input, one sentence each; empty where it can be planned. Being overdue, or having no
 * window in time, is not wrong: it is answered by the least-late plan.
 */
export function planProblems(input: PlanInput): string[] {
  const problems: string[] = [];
  const complain = (condition: boolean, words: string): void => {
    if (condition) problems.push(words);
  };
  const days: [string, string][] = [
    ['The day planned from', input.asOfOn],
    ['The end of the horizon', input.horizonEndOn],
    ...input.windows.flatMap(({ id, opensOn, closesOn }): [string, string][] => [
      [`The opening of window ${id}`, opensOn],
      [`The closing of window ${id}`, closesOn],
    ]),
    ...input.tasks.flatMap(({ name, dueOn }): [string, string][] =>
      dueOn === null ? [] : [[`The due date of ${name}`, dueOn]],
    ),
  ];
  for (const [what, day] of days) complain(!isDay(day), `${what} is not a calendar day: "${day}".`);
  complain(input.horizonEndOn <= input.asOfOn, 'The horizon ends before it begins.');
  complain(
    !/^[A-Z]{3}$/.test(input.currency),
    `"${input.currency}" is not a currency code of three letters.`,
  );
  complain(
    !(input.contingencyShare >= 0 && input.contingencyShare <= 1),
    'The contingency must be a share from 0 to 1.',
  );
  complain(!isCount(input.orderMarginDays), 'The margin for ordering must be whole days, 0 or more.');
  for (const kind of VISIT_KINDS) {
    const terms = input.visitTerms[kind];
    if (terms === undefined) continue;
    complain(
      !(isCount(terms.costMinor) && terms.costMinor > 0),
      `A visit (${kind}) must cost more than nothing.`,
    );
    complain(
      !(terms.hours >= 0 && Number.isFinite(terms.hours)),
      `The hours of a visit (${kind}) must be 0 or more.`,
    );
  }
  for (const window of input.windows) {
    complain(window.closesOn < window.opensOn, `Window ${window.id} closes before it opens.`);
    for (const [kind, costMinor] of Object.entries(window.visitCostMinor ?? {})) {
      complain(
        !(isCount(costMinor) && costMinor > 0),
        `A visit (${kind}) in window ${window.id} must cost more than nothing.`,
      );
    }
  }
  problems.push(...repeated('Window', input.windows), ...repeated('Task', input.tasks));
  const taskIds = new Set(input.tasks.map(({ id }) => id));
  for (const task of input.tasks) {
    for (const [kind, terms] of Object.entries(task.terms)) {
      complain(
        !isWorkTerms(terms),
        `${task.name}: cost and hours (${kind}) must be 0 or more, cost in whole minor units.`,
      );
    }
    complain(!isCount(task.leadDays), `${task.name}: the lead time must be whole days, 0 or more.`);
    complain(
      task.againAfterDays !== null && !(isCount(task.againAfterDays) && task.againAfterDays > 0),
      `${task.name}: the days until it is due again must be whole and more than 0.`,
    );
    for (const id of [...task.alsoDoneBy, ...task.needs]) {
      complain(!taskIds.has(id), `${task.name} refers to a task that is not there: ${id}.`);
      complain(id === task.id, `${task.name} refers to itself.`);
    }
  }
  return problems;
}

function isDay(day: string): boolean {
  try {
    dayNumber(day);
    return true;
  } catch {
    return false;
  }
}

function isCount(value: number): boolean {
  return Number.isSafeInteger(value) && value >= 0;
}

function isWorkTerms({ costMinor, hours }: WorkTerms): boolean {
  return isCount(costMinor) && Number.isFinite(hours) && hours >= 0;
}

function repeated(what: string, rows: readonly { id: string }[]): string[] {
  const seen = new Set<string>();
  const twice = new Set<string>();
  for (const { id } of rows) (seen.has(id) ? twice : seen).add(id);
  return [...twice].map((id) => `${what} ${id} is given twice.`);
}

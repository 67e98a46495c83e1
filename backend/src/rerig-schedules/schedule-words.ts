import type { PlanCause } from '@stayledger/shared/rerig-schedule/diff-plans';

const KIND_WORDS = {
  aloft: 'aloft with the mast up',
  'mast-out-afloat': 'mast out, afloat',
  'mast-out-ashore': 'mast out, ashore',
} as const;

/** What a kind of visit is called. */
export function visitKindWords(kind: keyof typeof KIND_WORDS): string {
  return KIND_WORDS[kind];
}

/**
 * Why a plan changed, one sentence. Days stay as they are stored: whoever reads formats nothing in a list of causes.
 *
 * @param labels what windows are called
 */
export function causeWords(cause: PlanCause, labels: ReadonlyMap<string, string>): string {
  switch (cause.cause) {
    case 'due-date-moved':
      return `${cause.name}: its date moved from ${cause.fromOn ?? 'none'} to ${cause.toOn ?? 'none'}.`;
    case 'task-added':
      return `${cause.name} is new in the plan.`;
    case 'task-gone':
      return `${cause.name} is no longer in the register.`;
    case 'task-terms-changed':
      return `${cause.name}: its price, hours, life or lead time changed.`;
    case 'window-added':
      return `${labels.get(cause.windowId) ?? cause.windowId} came within the plan.`;
    case 'window-gone':
      return `${labels.get(cause.windowId) ?? cause.windowId} can no longer be used.`;
    case 'window-changed':
      return `${labels.get(cause.windowId) ?? cause.windowId} opens or closes on another day.`;
    case 'visit-terms-changed':
      return `A visit (${visitKindWords(cause.kind)}) costs or takes something else.`;
    case 'decisions-changed':
      return 'Something was settled by hand.';
    case 'day-moved-on':
      return `The plan before was made on ${cause.fromOn}.`;
  }
}

import type {
  PlannedVisitDto,
  RerigPlanDto,
  ScheduleState,
} from '@stayledger/shared/contracts/rerig-schedules';
import type { Formatter } from '../../lib/formatting/format';

export const VISIT_KIND_WORDS: Record<PlannedVisitDto['kind'], string> = {
  aloft: 'aloft, mast up',
  'mast-out-afloat': 'mast out, afloat',
  'mast-out-ashore': 'mast out, ashore',
};

export const STATE_WORDS: Record<ScheduleState, string> = {
  draft: 'Draft',
  proposed: 'Proposed to the owner',
  accepted: 'Accepted by the owner',
  booked: 'Booked at the yard',
  done: 'Done',
};

export const PREFERENCE_WORDS: Record<RerigPlanDto['alternatives'][number]['preference'], string> = {
  'least-cost': 'Least cost',
  'fewest-visits': 'Fewest visits',
  'latest-allowed': 'Each part as late as allowed',
};

/** Minor units in one unit of a currency: 100 cents in a euro, 1 in a yen. */
export function minorPerUnit(currency: string): number {
  const { maximumFractionDigits = 2 } = new Intl.NumberFormat('en', {
    style: 'currency',
    currency,
  }).resolvedOptions();
  return 10 ** maximumFractionDigits;
}

/** Minor units as an amount of the currency, without cents: these are estimates. "EUR 12 480". */
export function money(minor: number, currency: string, format: Pick<Formatter, 'number'>): string {
  return `${currency}\u00a0${format.number(minor / minorPerUnit(currency))}`;
}

/** What was past its date before there was a plan no plan can help; what a plan itself lets run late, it can. */
export function isAcceptable(plan: RerigPlanDto['plan'] | undefined): boolean {
  return plan !== undefined && plan.lateTasks.every(({ reason }) => reason === 'overdue-already');
}

/** What a window is called. */
export function windowLabel(plan: Pick<RerigPlanDto, 'windows'>, windowId: string): string {
  return plan.windows.find(({ id }) => id === windowId)?.label ?? windowId;
}

import type { FleetRowDto, RIG_TYPES, USE_KINDS } from '@stayledger/shared/contracts/vessels';
import type { Formatter } from '../../lib/formatting/format';

export const RIG_TYPE_WORDS: Record<(typeof RIG_TYPES)[number], string> = {
  'masthead-sloop': 'Masthead sloop',
  'fractional-sloop': 'Fractional sloop',
  cutter: 'Cutter',
  ketch: 'Ketch',
  yawl: 'Yawl',
  schooner: 'Schooner',
  other: 'Another rig',
};

export const USE_KIND_WORDS: Record<(typeof USE_KINDS)[number], string> = {
  private: 'Private',
  charter: 'Charter',
  'sail-training': 'Sail training',
  'sail-cargo': 'Sail cargo',
};

export const RULE_WORDS = { fatigue: 'fatigue allowance', calendar: 'calendar rule' } as const;

/** "Overdue since 3 May 2026" or "replace by spring 2029"; what stands beside the governing part. */
export function dueWords(
  governing: NonNullable<FleetRowDto['governing']>,
  format: Formatter,
  todayOn: string,
): string {
  if (governing.due === 'overdue') return `overdue since ${format.day(governing.replaceByOn)}`;
  return `replace by ${format.dueDay(governing.replaceByOn, todayOn)}`;
}

/** "2 overdue, 1 due, 5 not assessed of 9 parts": what is missing from the picture is counted too. */
export function countWords(counts: FleetRowDto['counts']): string {
  if (counts.parts === 0) return 'no parts yet';
  const said = [
    counts.overdue > 0 && `${counts.overdue} overdue`,
    counts.due > 0 && `${counts.due} due`,
    counts.notAssessed > 0 && `${counts.notAssessed} not assessed`,
    counts.calendarOnly > 0 && `${counts.calendarOnly} calendar only`,
    counts.assessed > 0 && `${counts.assessed} assessed`,
  ].filter((words) => words !== false);
  return `${counts.parts} ${counts.parts === 1 ? 'part' : 'parts'}: ${said.join(', ')}`;
}

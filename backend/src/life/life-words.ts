import type { PartStandingDto } from '@stayledger/shared/contracts/rig';
import { addMonths } from '@stayledger/shared/fatigue/life/days';

const MONTHS = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
];

/** What the sentences about a part are made from. */
export interface PartInWords {
  /** "Cap shroud, port" */
  label: string;
  standing: PartStandingDto;
  /** Today in the vessel's zone. */
  todayOn: string;
  plannedHoursPerYear: number | null;
  /** Sentence of the calendar rule; null where the material has none. */
  calendarWords: string | null;
  wouldGiveDate: readonly string[];
}

/**
 * A day as people plan with it: within twelve months the day itself, beyond that season and year, since nothing that
 * far ahead is known to the day.
 */
export function dayInWords(day: string, todayOn: string): string {
  const [year, month, date] = day.split('-').map(Number);
  if (day <= addMonths(todayOn, 12)) return `${date} ${MONTHS[month - 1]} ${year}`;
  if (month === 12) return `winter ${year}/${String(year + 1).slice(2)}`;
  if (month <= 2) return `winter ${year - 1}/${String(year).slice(2)}`;
  return `${month <= 5 ? 'spring' : month <= 8 ? 'summer' : 'autumn'} ${year}`;
}

/** "18 %", "0.4 %", and above the whole "1.4 times its allowance". */
export function allowanceInWords(used: number): string {
  if (used >= 1) return `${used.toFixed(1)} times its fatigue allowance is used`;
  const percent = 100 * used;
  if (percent > 0 && percent < 0.1) return 'Less than 0.1 % of its fatigue allowance is used';
  return `${percent < 10 ? percent.toFixed(1) : Math.round(percent)} % of its fatigue allowance is used`;
}

/** The sentences at the top of a part's page, for people of the trade. */
export function headlineOf(words: PartInWords): string {
  return `${words.label}: ${[...fatigueSentences(words), ...dateSentences(words)].join(' ')}`;
}

function fatigueSentences({ standing, wouldGiveDate, plannedHoursPerYear, todayOn }: PartInWords): string[] {
  if (standing.assessment === 'calendar-only')
    return ['Fibre, kept by its calendar; no fatigue is assessed.'];
  if (standing.assessment === 'not-assessed') {
    return ['Not assessed for fatigue.', standing.notAssessedReason ?? ''].filter((words) => words !== '');
  }
  const used = standing.allowanceUsed ?? 0;
  const sentences = [`${allowanceInWords(used)}, governed by its ${standing.governingDetail}.`];
  if (used >= 1) return sentences;
  if (standing.fatigueReplaceByOn !== null) {
    sentences.push(
      `At the planned ${Math.round(plannedHoursPerYear ?? 0)} sailing hours a year it is used up by ${dayInWords(standing.fatigueReplaceByOn, todayOn)}.`,
    );
  } else if (wouldGiveDate.length > 0) {
    sentences.push(`No fatigue date yet. It takes: ${wouldGiveDate.map(lowerFirst).join(' ')}`);
  } else {
    sentences.push('At the planned sailing it is not used up within a hundred years.');
  }
  return sentences;
}

function dateSentences({ standing, calendarWords, todayOn }: PartInWords): string[] {
  const { replaceByOn, governingRule, due } = standing;
  if (replaceByOn === null) return calendarWords === null ? [] : [calendarWords];
  const because = governingRule === 'calendar' ? 'The calendar comes first' : 'The fatigue rule comes first';
  const why = governingRule === 'calendar' && calendarWords !== null ? ` ${calendarWords}` : '';
  if (due === 'overdue')
    return [`Overdue: it was to be replaced by ${dayInWords(replaceByOn, todayOn)}.${why}`];
  return [`${because}: replace by ${dayInWords(replaceByOn, todayOn)}.${why}`];
}

function lowerFirst(sentence: string): string {
  return sentence.charAt(0).toLowerCase() + sentence.slice(1);
}

/** The same for the owner: no percentages, no words of the trade that are not explained. */
export function plainHeadlineOf({ standing, todayOn, plannedHoursPerYear }: PartInWords): string {
  const sentences = [plainFatigue(standing)];
  if (
    standing.assessment === 'assessed' &&
    standing.fatigueReplaceByOn === null &&
    (standing.allowanceUsed ?? 0) < 1
  ) {
    sentences.push(
      plannedHoursPerYear === null
        ? 'Say how many hours you plan to sail in a year, and it can be said how long that lasts.'
        : 'More recorded sailing is needed before it can be said how long that lasts.',
    );
  }
  if (standing.replaceByOn !== null) {
    const reason =
      standing.governingRule === 'calendar' ? 'because of its age' : 'because of the loads it has carried';
    const when = dayInWords(standing.replaceByOn, todayOn);
    sentences.push(
      standing.due === 'overdue'
        ? `It should have been replaced by ${when}, ${reason}. Speak to your rigger.`
        : `Replace it by ${when}, ${reason}.`,
    );
  }
  return sentences.join(' ');
}

function plainFatigue(standing: PartStandingDto): string {
  if (standing.assessment === 'calendar-only') return 'This part is replaced by its age alone.';
  if (standing.assessment === 'not-assessed') {
    return 'How much wear the sailing has put on this part is not known, because its loads were not recorded.';
  }
  const used = standing.allowanceUsed ?? 0;
  if (used >= 1) return 'The wear this part was allowed is used up.';
  return `${shareInWords(used)} of the wear this part is allowed has been used.`;
}

/** Shares people have a word for, each from the given value on. */
const SHARES: readonly [number, string][] = [
  [0, 'Almost nothing'],
  [0.02, 'A small part'],
  [0.08, 'About a tenth'],
  [0.15, 'About a fifth'],
  [0.23, 'About a quarter'],
  [0.29, 'About a third'],
  [0.37, 'About two fifths'],
  [0.45, 'About half'],
  [0.55, 'About three fifths'],
  [0.63, 'About two thirds'],
  [0.71, 'About three quarters'],
  [0.78, 'About four fifths'],
  [0.86, 'About nine tenths'],
  [0.95, 'Nearly all'],
];

function shareInWords(share: number): string {
  return SHARES.findLast(([from]) => share >= from)?.[1] ?? SHARES[0][1];
}

import type { FindingPlace } from './findings.js';
import type { LogFinding, LogFindingCode } from './load-log.js';

/** What the words of a finding need beyond its code, count and place. */
export interface FindingFacts {
  gapLimitS: number;
  /** Hours within gaps. */
  gapHours: number;
  /** Text of the first unreadable cell of a column. */
  sample: (column: string | undefined) => string;
  /** Largest load of a column and its limit, kN. */
  maxKn: (column: string | undefined) => number;
  limitKn: (column: string | undefined) => number;
  /** Grid a column was coarsened to, kN. */
  step: (column: string | undefined) => number;
  /** Dominant frequency of a column over the sampling rate. */
  rateShare: (column: string | undefined) => number;
  /** What the header says the unit is. */
  headerUnit: (column: string | undefined) => string;
}

type Words = Pick<LogFinding, 'severity' | 'message' | 'action'>;

/** A finding in plain words: what and where, and what was done about it or what mends it. */
export function describeFinding(
  code: LogFindingCode,
  count: number,
  place: FindingPlace,
  facts: FindingFacts,
): Words {
  const line = place.line === undefined ? '' : ` first in line ${place.line}`;
  const column = place.column === undefined ? '' : `"${place.column}"`;
  const times = count === 1 ? 'once' : `${count} times`;
  const words: Record<LogFindingCode, () => Words> = {
    gap: () => ({
      severity: 'warning',
      message: `The log pauses for more than ${short(facts.gapLimitS)} s ${times}, ${short(facts.gapHours)} h in all,${line}.`,
      action: 'The pauses are unlogged time. Loads before and after are taken as neighbours, a lower bound.',
    }),
    'time-backwards': () => ({
      severity: 'serious',
      message: `The clock runs backwards ${times},${line}.`,
      action:
        'Rows were counted in the order of the file. Check the clock of the recorder, or cut the log there.',
    }),
    'time-repeated': () => ({
      severity: 'info',
      message: `The same time stands in two rows in a row ${times},${line}.`,
      action: 'All rows were counted.',
    }),
    'time-unreadable': () => ({
      severity: 'warning',
      message: `The time is missing or unreadable in ${rows(count)},${line}: "${facts.sample(undefined)}".`,
      action: 'Loads of these rows were counted, with the day of the row before.',
    }),
    'time-ambiguous': () => ({
      severity: 'warning',
      message: 'The times do not say which zone they are in.',
      action: 'They were read as UTC. Choose the zone of the recorder if it was another.',
    }),
    'short-row': () => ({
      severity: 'warning',
      message: `${capital(rows(count))} ${count === 1 ? 'ends' : 'end'} before the last column,${line}.`,
      action: 'What is missing was passed over.',
    }),
    'unreadable-cell': () => ({
      severity: 'warning',
      message: `${column} holds something that is no load in ${rows(count)},${line}: "${facts.sample(place.column)}".`,
      action: 'These cells were passed over as missing samples.',
    }),
    'missing-cell': () => ({
      severity: 'info',
      message: `${column} is empty in ${rows(count)}.`,
      action: 'Missing samples were passed over; the loads before and after are taken as neighbours.',
    }),
    stuck: () => ({
      severity: 'warning',
      message: `${column} stands at one value for two minutes or more ${times} while other columns move,${line}.`,
      action: 'Counted as recorded. If the sensor was stuck, its cycles are missing: exclude the interval.',
    }),
    spike: () => ({
      severity: 'info',
      message: `${column} has ${count === 1 ? 'a single-sample peak' : `${count} single-sample peaks`} far above the samples around,${line}.`,
      action: 'Marked, not removed: a slam or a gybe looks the same. Compare with what happened on board.',
    }),
    saturation: () => ({
      severity: 'serious',
      message: `${column} is cut off flat at ${short(facts.maxKn(place.column))} kN ${times},${line}.`,
      action:
        'The sensor seems to have reached its range; true peaks were higher and the count is a lower bound.',
    }),
    'implausible-load': () => ({
      severity: 'serious',
      message: `${column} is above ${short(facts.limitKn(place.column))} kN in ${rows(count)}, up to ${short(facts.maxKn(place.column))} kN,${line}.`,
      action: 'Counted as recorded. Exclude the interval if the load cannot have happened.',
    }),
    'low-rate': () => ({
      severity: 'serious',
      message: `${column} moves faster than it was sampled: its main frequency is ${short(facts.rateShare(place.column))} of the sampling rate.`,
      action:
        'Peaks between samples are lost, recorded damage is a lower bound. Record at ten times that frequency.',
    }),
    averaged: () => ({
      severity: 'serious',
      message: `${column} seems to hold averages of an interval.`,
      action: 'Counted as recorded, a lower bound. Let the recorder store samples, or minimum and maximum.',
    }),
    'unit-doubt': () => ({
      severity: 'serious',
      message:
        facts.headerUnit(place.column) === ''
          ? `${column} reaches ${short(facts.maxKn(place.column))} kN, far above the ${short(facts.limitKn(place.column))} kN possible: the unit may be another.`
          : `The header of ${column} says ${facts.headerUnit(place.column)}, but another unit was chosen.`,
      action: 'Counted in the unit chosen. Check it before posting.',
    }),
    truncated: () => ({
      severity: 'warning',
      message: `The file ends in the middle of a row, line ${place.line}.`,
      action: 'The last cell of that row was passed over. Check that the file was copied completely.',
    }),
    'residue-capped': () => ({
      severity: 'serious',
      message: `${column} has more different loads than can be held exactly.`,
      action: `It was counted rounded to ${short(facts.step(place.column))} kN.`,
    }),
    'no-rows': () => ({
      severity: 'serious',
      message: 'The log has no rows.',
      action: 'Nothing was counted.',
    }),
  };
  const described = words[code]();
  return { ...described, message: described.message.replace(/,(\.|:|$)/g, '$1') };
}

function rows(count: number): string {
  return count === 1 ? 'one row' : `${count} rows`;
}

function capital(text: string): string {
  return text[0].toUpperCase() + text.slice(1);
}

/** Three digits or more where the figure is large. */
function short(value: number): string {
  return String(Math.abs(value) >= 1000 ? Math.round(value) : Number(value.toPrecision(3)));
}

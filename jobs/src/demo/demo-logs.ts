import { gzipSync } from 'node:zlib';
import type { LogMapping } from '@stayledger/shared/contracts/load-logs';
import { dayNumber } from '@stayledger/shared/fatigue/life/days';
import type { Side } from '@stayledger/shared/rig/positions';
import { type ChannelModel, loadHistory, type Outing } from './load-history.js';
import { csvHeader, csvLine } from './log-csv.js';
import { SeededRandom } from './seeded-random.js';

/** A place on a demo rig that has a sensor, and how it answers to wind and sea. */
export interface DemoSensor {
  kind: string;
  side: Side;
  model: ChannelModel;
}

/** A log of the demo: a function of its name and the day of the first start alone. */
export interface DemoLog {
  fileName: string;
  /** What becomes of it after counting. */
  then: 'post' | 'wait';
  mapping: (positionIdOf: (kind: string, side: Side) => string) => LogMapping;
  bytes: () => Buffer;
}

const DAY_MS = 86_400_000;
const HOUR_MS = 3_600_000;
const RATE_HZ = 1;
const DECIMALS = 1;

const CUTTER_SENSORS: readonly DemoSensor[] = [
  sensor('cap-shroud', 'port', { column: 'cap_port_kN', dockKn: 10, at20KnotsKn: 7.5, perMetreKn: 1.5 }),
  sensor('cap-shroud', 'starboard', {
    column: 'cap_starboard_kN',
    dockKn: 10,
    at20KnotsKn: 7.5,
    perMetreKn: 1.5,
  }),
  sensor('forestay', 'centre', { column: 'forestay_kN', dockKn: 11, at20KnotsKn: 6.5, perMetreKn: 1.5 }),
  sensor('backstay', 'centre', { column: 'backstay_kN', dockKn: 7, at20KnotsKn: 4, perMetreKn: 0.9 }),
];

const SLOOP_SENSORS: readonly DemoSensor[] = [
  sensor('cap-shroud', 'port', { column: 'V1 port [kN]', dockKn: 9, at20KnotsKn: 9, perMetreKn: 1.4 }),
  sensor('cap-shroud', 'starboard', {
    column: 'V1 starboard [kN]',
    dockKn: 9,
    at20KnotsKn: 9,
    perMetreKn: 1.4,
  }),
];

/** Logs of the charter cutter: one posted, one waiting to be looked at. */
export function cutterLogs(firstDayOn: string): DemoLog[] {
  const day = (daysAgo: number, hour: number) => startOf(firstDayOn, daysAgo, hour);
  return [
    log('ternesund-cruise.csv.gz', 'post', CUTTER_SENSORS, [
      outing(day(47, 7), 6, 13, 0.7, 5.2),
      outing(day(46, 6), 7, 17, 1.2, 5.8),
      outing(day(45, 8), 5, 11, 0.5, 4.6),
      outing(day(43, 6), 8, 21, 1.9, 6.6),
      outing(day(42, 7), 6, 15, 1.0, 5.5),
    ]),
    log('ternesund-last-week.csv.gz', 'wait', CUTTER_SENSORS, [
      outing(day(6, 7), 3, 14, 0.8, 5.1),
      outing(day(4, 9), 4, 19, 1.5, 6.1),
    ]),
  ];
}

/** The poor log: a sensor that fails in several ways, as they do. */
export function sloopLogs(firstDayOn: string): DemoLog[] {
  const start = startOf(firstDayOn, 12, 9);
  return [
    log('snarfare-saturday.csv.gz', 'wait', SLOOP_SENSORS, [outing(start, 4, 16, 0.7, 4.4)], (row, loads) =>
      faultsOf(row, loads),
    ),
  ];
}

/** The port sensor cut off at 16.5 kN, stuck for a quarter of an hour, writing words; and two pauses of both. */
function faultsOf(row: number, loads: readonly number[]): readonly (number | string | null)[] | null {
  if ((row > 3000 && row < 4100) || (row > 9000 && row < 9900)) return null;
  const [port, ...others] = loads;
  if (row > 5000 && row < 5900) return [14.2, ...others];
  if (row % 997 === 0) return ['ERR', ...others];
  return [Math.min(port, 16.5), ...others];
}

function sensor(kind: string, side: Side, model: Omit<ChannelModel, 'side'>): DemoSensor {
  return { kind, side, model: { ...model, side } };
}

function outing(
  startMs: number,
  hours: number,
  windKn: number,
  waveHeightM: number,
  wavePeriodS: number,
): Outing {
  return { startMs, hours, conditions: { windKn, waveHeightM, wavePeriodS } };
}

function startOf(firstDayOn: string, daysAgo: number, hourUtc: number): number {
  return (dayNumber(firstDayOn) - daysAgo) * DAY_MS + hourUtc * HOUR_MS;
}

type Alter = (row: number, loads: readonly number[]) => readonly (number | string | null)[] | null;

function log(
  fileName: string,
  then: DemoLog['then'],
  sensors: readonly DemoSensor[],
  outings: readonly Outing[],
  alter: Alter = (_row, loads) => loads,
): DemoLog {
  return {
    fileName,
    then,
    mapping: (positionIdOf) => ({
      delimiter: ',',
      decimalComma: false,
      time: { column: 'time', format: 'iso', naiveOffsetMinutes: 0 },
      channels: sensors.map(({ kind, side, model }) => ({
        column: model.column,
        unit: 'kN',
        positionId: positionIdOf(kind, side),
      })),
    }),
    bytes: () => gzipSync(textOf(fileName, sensors, outings, alter)),
  };
}

function textOf(
  seed: string,
  sensors: readonly DemoSensor[],
  outings: readonly Outing[],
  alter: Alter,
): string {
  const models = sensors.map(({ model }) => model);
  const style = { columns: models.map(({ column }) => column), decimals: DECIMALS, wind: false };
  const random = new SeededRandom(seed);
  const lines = [csvHeader(style)];
  let row = 0;
  for (const one of outings) {
    for (const history of loadHistory(models, one, RATE_HZ, random)) {
      const loads = alter(row++, history.loads);
      if (loads !== null) lines.push(csvLine({ ...history, loads }, style));
    }
  }
  return lines.join('');
}

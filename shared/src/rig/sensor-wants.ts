import { addMonths } from '../fatigue/life/days.js';

/** What is recorded of a sensor, as far as it bears on trusting it. */
export interface SensorForWants {
  kind: 'pin' | 'link' | 'ram-pressure' | 'strain' | 'raw';
  position: string | null;
  fullScaleKn: number | null;
  errorPercent: number | null;
  scale: object | null;
  removedOn: string | null;
  /** Newest first. */
  events: readonly {
    kind: 'zero-check' | 'calibration' | 'battery';
    doneOn: string;
    rigState: 'slack' | 'dock-tune' | 'unstepped' | 'unknown' | null;
    statedTensionKn: number | null;
  }[];
  todayOn: string;
}

/** Common practice, no source. */
const ZERO_CHECK_MONTHS = 6;
const CALIBRATION_MONTHS = 24;

const SCALE_WANT = {
  pin: null,
  link: null,
  'ram-pressure': "The area of the ram's piston, to turn pressure into force.",
  strain: 'The axial stiffness of what the gauge is bonded to, to turn strain into force.',
  raw: 'Two points, a raw reading and its force each.',
} as const;

/**
 * What is missing before a sensor's zero and scale can be relied on, one sentence each, the gravest first. A sensor
 * that was taken off wants nothing. Intervals of six and twenty-four months are common practice without a source.
 */
export function sensorWants(sensor: SensorForWants): string[] {
  if (sensor.removedOn !== null) return [];
  const wants: string[] = [];
  const scale = SCALE_WANT[sensor.kind];
  if (scale !== null && sensor.scale === null) wants.push(scale);
  if (sensor.position === null) wants.push('The place whose load it measures.');
  wants.push(...zeroWants(sensor));
  const calibration = sensor.events.find(({ kind }) => kind === 'calibration');
  if (!calibration) wants.push('A calibration: none is recorded.');
  else if (addMonths(calibration.doneOn, CALIBRATION_MONTHS) < sensor.todayOn) {
    wants.push(`A calibration: the last is from ${calibration.doneOn}, more than two years ago.`);
  }
  if (sensor.fullScaleKn === null || sensor.errorPercent === null) {
    wants.push('Full scale and error class from its papers; without them its error is taken to be large.');
  }
  return wants;
}

function zeroWants({ events, todayOn }: SensorForWants): string[] {
  const zero = events.find(({ kind }) => kind === 'zero-check');
  if (!zero) return ['A zero check: none is recorded, so ranges count but means and shares do not.'];
  if (addMonths(zero.doneOn, ZERO_CHECK_MONTHS) < todayOn) {
    return [`A zero check: the last is from ${zero.doneOn}, more than six months ago.`];
  }
  const underTension = zero.rigState === 'dock-tune' || zero.rigState === 'unknown';
  if (underTension && zero.statedTensionKn === null) {
    return [
      'The tension the rig stood under at its last zero check: without it the zero may be off by the dock tune.',
    ];
  }
  return [];
}

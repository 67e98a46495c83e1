import type { RIG_STATES, SENSOR_EVENT_KINDS, SENSOR_KINDS } from '@stayledger/shared/contracts/sensors';

export const SENSOR_KIND_WORDS: Record<(typeof SENSOR_KINDS)[number], string> = {
  pin: 'Load pin',
  link: 'Load link',
  'ram-pressure': 'Pressure of a ram',
  strain: 'Strain gauge',
  raw: 'Raw signal',
};

export const EVENT_KIND_WORDS: Record<(typeof SENSOR_EVENT_KINDS)[number], string> = {
  'zero-check': 'Zero check',
  calibration: 'Calibration',
  battery: 'New battery',
};

export const RIG_STATE_WORDS: Record<(typeof RIG_STATES)[number], string> = {
  slack: 'slack',
  'dock-tune': 'under dock tune',
  unstepped: 'mast unstepped',
  unknown: 'state not noted',
};

import type { LoadLogConfig } from '@stayledger/shared/fatigue/load-history/load-log';
import { LOAD_COLUMNS } from './make-log-file.js';

/** Grid the loads of the bench's log are counted on: the resolution it is written in. */
export const STEP_KN = 0.01;

/** All six loads of the bench's log, by its own times. */
export const LOG_CONFIG: LoadLogConfig = {
  time: { column: 'time' },
  channels: LOAD_COLUMNS.map((column) => ({ column, unit: 'kN' as const, step: STEP_KN })),
};

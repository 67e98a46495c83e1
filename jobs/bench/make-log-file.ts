import { closeSync, existsSync, mkdirSync, openSync, renameSync, writeSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { seededRandom } from './seeded-random.js';

const HEADER = 'time,cap_port,cap_stbd,lower_port,lower_stbd,forestay,backstay,aws_kn\n';
/** The load columns of the file, kN. */
export const LOAD_COLUMNS = ['cap_port', 'cap_stbd', 'lower_port', 'lower_stbd', 'forestay', 'backstay'];
/** Rows a second. */
export const RATE_HZ = 10;
const START_MS = 1_767_225_600_000;
const PIECE = 1 << 22;

/**
 * A seeded log of six loads and a wind speed at 10 Hz, made once and kept in the temporary folder.
 * @returns its path
 */
export function makeLogFile(rows: number): string {
  const folder = join(tmpdir(), 'stayledger-bench');
  mkdirSync(folder, { recursive: true });
  const path = join(folder, `log-v3-${rows}.csv`);
  if (existsSync(path)) return path;
  const random = seededRandom(20260101);
  const part = `${path}.${process.pid}.part`;
  const file = openSync(part, 'w');
  let text = HEADER;
  for (let i = 0; i < rows; i++) {
    const ms = START_MS + (i * 1000) / RATE_HZ;
    const wind = 14 + 6 * Math.sin(i / 90_000) + 2 * Math.sin(i / 700);
    const swell = Math.sin((2 * Math.PI * i) / 47) + 0.4 * Math.sin((2 * Math.PI * i) / 31 + 1);
    text += new Date(ms).toISOString();
    for (let channel = 0; channel < LOAD_COLUMNS.length; channel++) {
      const base = [14, 3, 9, 2, 18, 11][channel];
      const sway = [4, 1.2, 2.5, 0.9, 5, 3][channel];
      const noise = (random() + random() - 1) * 0.04;
      text += `,${((base * wind) / 14 + sway * swell * (0.6 + 0.4 * Math.sin(i / 3000 + channel)) + noise).toFixed(2)}`;
    }
    text += `,${(wind + random()).toFixed(1)}\n`;
    if (text.length > PIECE) {
      writeSync(file, text);
      text = '';
    }
  }
  writeSync(file, text);
  closeSync(file);
  renameSync(part, path);
  return path;
}

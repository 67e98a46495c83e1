import { createReadStream } from 'node:fs';
import { createInterface } from 'node:readline';
import { STEP_KN } from './log-config.js';
import { LOAD_COLUMNS } from './make-log-file.js';
import { slowDamage } from './slow-damage.js';

/** Damage of each load column of the bench's log: lines as strings, cells split and read by Number. */
export async function slowLogDamage(path: string, rows: number): Promise<number[]> {
  const columns = LOAD_COLUMNS.map(() => new Float64Array(rows));
  let row = -1;
  for await (const line of createInterface({ input: createReadStream(path) })) {
    if (row >= 0) {
      const cells = line.split(',');
      for (let c = 0; c < columns.length; c++) columns[c][row] = Number(cells[c + 1]);
    }
    row++;
  }
  if (row !== rows) throw new Error(`the log has ${row} rows, not ${rows}`);
  return columns.map((loads) => slowDamage(loads, STEP_KN));
}

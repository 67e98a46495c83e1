import type { ForceUnit } from '../../units/force.js';
import { columnsNamed } from './columns-named.js';
import { LogConfigError } from './load-log.js';
import type { LogRecognition } from './recognise-log.js';
import { readColumnHeader } from './read-column-header.js';

/**
 * The force unit a column's header states.
 *
 * @returns `null` when the header states none, or the column is not among the recognised ones
 * @throws LogConfigError when it states one that is ambiguous, such as t
 */
export function unitOfColumn(recognition: LogRecognition, name: string): ForceUnit | null {
  const [column] = columnsNamed(recognition.columns, name);
  if (column === undefined) return null;
  if (column.unit !== 'unknown') return column.unit;
  const { doubt } = readColumnHeader(column.header);
  if (doubt !== null) throw new LogConfigError(`the unit of column "${name}" must be configured: ${doubt}`);
  return null;
}

import { toKn, type ForceUnit } from '@stayledger/shared/units/force';

/** A number as the log writes it; anything else is no load. */
function readLoad(text: string, decimalComma: boolean): number | null {
  const plain = (decimalComma ? text.replace(',', '.') : text).trim();
  if (plain === '') return null;
  const value = Number(plain);
  return Number.isFinite(value) ? value : null;
}

/** The largest load among the first rows of a column, in kN; null when none of them is a number. */
export function largestFirstLoadKn(
  firstValues: readonly string[],
  unit: ForceUnit,
  decimalComma: boolean,
): number | null {
  const loads = firstValues
    .map((text) => readLoad(text, decimalComma))
    .filter((value) => value !== null)
    .map((value) => toKn(value, unit));
  return loads.length === 0 ? null : Math.max(...loads);
}

/** A cell whose size no rig has; it is read as unreadable rather than counted. */
export const LARGEST_READABLE_LOAD = 1e15;

/**
 * The number in a cell, the slow and general way: sign, leading or trailing point, exponent, surrounding blanks.
 *
 * @param text the cell, quotes removed
 * @param decimalComma whether the decimal sign is a comma
 * @returns the same double as `Number`; NaN for an empty cell or one that says NaN; `null` for anything else
 */
export function parseLoadText(text: string, decimalComma: boolean): number | null {
  const trimmed = text.trim();
  if (trimmed === '' || trimmed.toLowerCase() === 'nan') return NaN;
  const dotted = decimalComma ? trimmed.replace(',', '.') : trimmed;
  if (decimalComma && trimmed.includes('.')) return null;
  if (!/^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/.test(dotted)) return null;
  const value = Number(dotted);
  return Math.abs(value) <= LARGEST_READABLE_LOAD ? value : null;
}

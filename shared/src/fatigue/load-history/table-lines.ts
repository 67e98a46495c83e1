/** Characters tried between cells. */
export const DELIMITERS: readonly string[] = [',', ';', '\t', '|'];

const LINES_LOOKED_AT = 200;
const MOST_JOINED_LINES = 20;

/** The first lines of a table, lines inside quotes joined, each with the number of the line it begins in. */
export interface TableLines {
  lines: string[];
  /** Counted from 1; one longer than `lines`: the last entry is the line after them. */
  lineNumbers: number[];
}

/**
 * The first lines of a text table.
 *
 * @param text the beginning of the table
 * @param onlyCr whether lines end in CR alone
 * @param cut whether the text may end in the middle of a line, which is then left out
 */
export function tableLines(text: string, onlyCr: boolean, cut: boolean): TableLines {
  const physical = text.split(onlyCr ? '\r' : /\r?\n/);
  if (cut && physical.length > 2) physical.pop();
  const size = Math.min(physical.length, LINES_LOOKED_AT);
  const lines: string[] = [];
  const lineNumbers: number[] = [];
  const isOpen = (line: string) => (line.split('"').length - 1) % 2 === 1;
  let at = 0;
  while (at < size) {
    lineNumbers.push(at + 1);
    let end = at + 1;
    if (isOpen(physical[at])) {
      // A quote that stays open for long is an ordinary character.
      const limit = Math.min(size, at + MOST_JOINED_LINES);
      while (end < limit && !isOpen(physical[end])) end++;
      end = end < limit ? end + 1 : at + 1;
    }
    lines.push(physical.slice(at, end).join('\n'));
    at = end;
  }
  lineNumbers.push(at + 1);
  return { lines, lineNumbers };
}

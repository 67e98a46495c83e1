/**
 * The cells of one line of a text table, blanks around them and quotes removed.
 *
 * @param line one line without its line end
 * @param delimiter one character
 */
export function splitTableLine(line: string, delimiter: string): string[] {
  const cells: string[] = [];
  let cell = '';
  let quoted = false;
  let wasQuoted = false;
  for (let i = 0; i < line.length; i++) {
    const character = line[i];
    if (quoted) {
      if (character !== '"') cell += character;
      else if (line[i + 1] === '"') cell += line[i++];
      else quoted = false;
    } else if (character === '"' && cell.trim() === '' && !wasQuoted) {
      cell = '';
      quoted = true;
      wasQuoted = true;
    } else if (character === delimiter) {
      cells.push(cell.trim());
      cell = '';
      wasQuoted = false;
    } else {
      cell += character;
    }
  }
  cells.push(cell.trim());
  return cells;
}

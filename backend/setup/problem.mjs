/** Something the person at the keyboard can mend. Printed as plain lines without a stack; exit status 2. */
export class Problem extends Error {
  constructor(...lines) {
    super(lines.join('\n'));
    this.name = 'Problem';
  }
}

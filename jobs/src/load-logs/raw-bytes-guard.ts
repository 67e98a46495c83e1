import { BadFileError } from './bad-file-error.js';

const NUL = 0;
const LF = 10;
const CR = 13;
/** Far beyond any line of a log, well within memory. */
const LINE_BYTES_MAX = 1024 ** 2;
const COLUMNS_MAX = 2000;
const DELIMITERS = [',', ';', '\t', '|'].map((delimiter) => delimiter.charCodeAt(0));

/**
 * Looks at the bytes of a log before they are read: refuses what is no text, lines without end, and tables that are
 * absurdly wide, all of which would take memory or time without ever becoming a count.
 */
export class RawBytesGuard {
  private sinceLineEnd = 0;
  private firstLine: number[] | null = [0, 0, 0, 0];

  /** @param rows how many rows were read so far, to say where */
  constructor(private readonly progress: { readonly rows: number }) {}

  /** @throws BadFileError */
  check(chunk: Uint8Array): void {
    if (chunk.includes(NUL)) {
      throw new BadFileError(
        'not-text',
        `${this.place()} there is a NUL byte, so this is not plain text. Export the log as .csv or .csv.gz.`,
      );
    }
    if (this.firstLine) this.checkWidth(chunk, this.firstLine);
    const lastEnd = Math.max(chunk.lastIndexOf(LF), chunk.lastIndexOf(CR));
    this.sinceLineEnd = lastEnd < 0 ? this.sinceLineEnd + chunk.length : chunk.length - 1 - lastEnd;
    if (this.sinceLineEnd > LINE_BYTES_MAX) {
      throw new BadFileError(
        'line-too-long',
        `${this.place()} a line is longer than 1 MiB; a quotation mark may be missing its partner. Export the log again.`,
      );
    }
  }

  private checkWidth(chunk: Uint8Array, counts: number[]): void {
    for (const byte of chunk) {
      if (byte === LF || byte === CR) {
        this.firstLine = null;
        return;
      }
      const delimiter = DELIMITERS.indexOf(byte);
      if (delimiter >= 0 && ++counts[delimiter] >= COLUMNS_MAX) {
        throw new BadFileError(
          'too-many-columns',
          `Line 1 has more than ${COLUMNS_MAX} columns. Export the time and the load columns only.`,
        );
      }
    }
  }

  private place(): string {
    const { rows } = this.progress;
    return rows === 0 ? 'Near the beginning' : `After about ${rows} rows`;
  }
}

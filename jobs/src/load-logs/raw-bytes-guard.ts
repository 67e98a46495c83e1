import { LOG_COLUMNS_MAX } from '@stayledger/shared/contracts/load-logs';

const NUL = 0;
const LF = 10;
const CR = 13;
/** Far beyond any line of a log, well within memory. */
const LINE_BYTES_MAX = 1024 ** 2;
const DELIMITERS = [',', ';', '\t', '|'].map((delimiter) => delimiter.charCodeAt(0));

/** Bytes that no log holds, and where: counted from the first unpacked byte. */
export class BadBytesError extends Error {
  override readonly name = 'BadBytesError';

  constructor(
    readonly code: string,
    readonly atByte: number,
    message: string,
  ) {
    super(message);
  }
}

/**
 * Looks at the bytes of a log before they are read: refuses what is no text, lines without end, and tables that are
 * absurdly wide, all of which would take memory or time without ever becoming a count.
 */
export class RawBytesGuard {
  /** Bytes seen so far. */
  seen = 0;
  private sinceLineEnd = 0;
  private firstLine: number[] | null = [0, 0, 0, 0];

  /** @throws BadBytesError */
  check(chunk: Uint8Array): void {
    const nul = chunk.indexOf(NUL);
    if (nul >= 0) {
      throw new BadBytesError(
        'not-text',
        this.seen + nul,
        'There is a NUL byte, so this is not plain text. Export the log as .csv or .csv.gz.',
      );
    }
    if (this.firstLine) this.checkWidth(chunk, this.firstLine);
    const lastEnd = Math.max(chunk.lastIndexOf(LF), chunk.lastIndexOf(CR));
    this.sinceLineEnd = lastEnd < 0 ? this.sinceLineEnd + chunk.length : chunk.length - 1 - lastEnd;
    this.seen += chunk.length;
    if (this.sinceLineEnd > LINE_BYTES_MAX) {
      throw new BadBytesError(
        'line-too-long',
        this.seen - this.sinceLineEnd,
        'Here begins a line longer than 1 MiB; a quotation mark may be missing its partner. Export the log again.',
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
      if (delimiter >= 0 && ++counts[delimiter] >= LOG_COLUMNS_MAX) {
        throw new BadBytesError(
          'too-many-columns',
          0,
          `This line has more than ${LOG_COLUMNS_MAX} columns. Export the time and the load columns only.`,
        );
      }
    }
  }
}

import { logText } from './log-text.js';
import type { LogTimeFormat } from './load-log.js';
import { LARGEST_READABLE_LOAD, parseLoadText } from './parse-load-text.js';
import { dateToMs, parseTimeText } from './parse-time-text.js';
import { isReadableInstant } from './readable-instant.js';

/** Rows handed over at once: 32 KiB a column, which stays in the nearest cache while it is counted. */
export const BLOCK_ROWS = 4096;

/** A row longer than this is no row of a load log; it is given up instead of filling memory. */
const LONGEST_ROW_BYTES = 1 << 20;
/** A quote that does not close within this many bytes is an ordinary character. */
const LONGEST_QUOTED_BYTES = 1 << 16;

const LF = 10;
const CR = 13;
const QUOTE = 34;

const POWERS_OF_TEN = Float64Array.from({ length: 23 }, (_, n) => Number(`1e${n}`));

/** Which bytes of a text table mean what, and which columns are wanted. */
export interface CsvLayout {
  /** Byte between cells. */
  delimiter: number;
  decimalComma: boolean;
  /** Byte that ends a line: 10, or 13 in tables whose lines end in CR alone. */
  lineEnd: number;
  /** Physical lines to pass over before the first row. */
  skipLines: number;
  /** Places of the number columns, counted from 0, in the order their values are wanted. */
  columns: readonly number[];
  /** Place and writing of the time column; `null`: none. */
  time: { column: number; format: LogTimeFormat; naiveOffsetMinutes: number } | null;
}

/** A block of rows, valid only during the call it is handed over in. */
export interface CsvBlock {
  rows: number;
  /** Line each row begins in, counted from 1. */
  lines: Int32Array;
  /** Epoch milliseconds; NaN where the cell held none. Empty without a time column. */
  timesMs: Float64Array;
  /** One array for each wanted column; NaN where the cell held no number. */
  values: readonly Float64Array[];
}

/** What the scanner tells about rows that are not as they should be. */
export interface CsvTrouble {
  /** A cell of a wanted column that is neither number, empty nor NaN; `place` indexes the layout's columns. */
  unreadableCell(place: number, line: number, text: string): void;
  /** A time cell that is none; an empty one too. */
  unreadableTime(line: number, text: string): void;
  /** A row without the columns from `column` on; `cut` when the table breaks off in it. */
  shortRow(line: number, column: number, cut: boolean): void;
  /** A row longer than a MiB, given up. */
  endlessRow(line: number): void;
}

/**
 * Reads a text table from bytes in any chunking and hands over blocks of numbers.
 *
 * No string and no object is made for a line or a cell on the usual path: digits are gathered in whole numbers
 * and divided once by an exact power of ten, which gives the double nearest to the text for up to 15 digits.
 * Everything unusual (quotes, exponents, blanks, signs, more digits, other characters) leaves for one slow path.
 */
export class CsvScanner {
  /** Whether a quoted cell was met; such a table must not be cut at a line end found blindly. */
  sawQuote = false;
  /** Rows handed over so far. */
  rows = 0;

  private readonly kinds: Int32Array;
  private readonly lastWanted: number;
  private readonly values: Float64Array[];
  private readonly timesMs: Float64Array;
  private filled = 0;
  private line = 0;
  private readonly lines = new Int32Array(BLOCK_ROWS);
  private toSkip: number;
  private carry = new Uint8Array(4096);
  private carried = 0;
  /** Below this many carried bytes another try at a quoted row is not worth it; doubled after each try. */
  private retryAt = 0;
  /** Inside a row that was given up: nothing counts before the next line end. */
  private discarding = false;
  private quotesMatter = true;
  /** Complaints about the row being read; a row that has to be read again must not complain twice. */
  private readonly complaints: (() => void)[] = [];
  /** Reading the last row of a table that does not end with a line end. */
  private cutShort = false;

  // The date last met, as its ten bytes and its midnight.
  private readonly date = new Uint8Array(10);
  private dateMs = NaN;
  // Results of the slow path: where the cell ends, and what it held.
  private cellEnd = 0;
  private cellValue = NaN;

  constructor(
    private readonly layout: CsvLayout,
    private readonly onBlock: (block: CsvBlock) => void,
    private readonly trouble: CsvTrouble,
  ) {
    const wanted = [...layout.columns, ...(layout.time === null ? [] : [layout.time.column])];
    this.lastWanted = Math.max(-1, ...wanted);
    // 0: pass over; n + 1: value array n; -1: time.
    this.kinds = new Int32Array(this.lastWanted + 1);
    this.values = layout.columns.map(() => new Float64Array(BLOCK_ROWS));
    layout.columns.forEach((column, place) => (this.kinds[column] = place + 1));
    if (layout.time !== null) this.kinds[layout.time.column] = -1;
    this.timesMs = new Float64Array(layout.time === null ? 0 : BLOCK_ROWS);
    this.toSkip = layout.skipLines;
  }

  /** Reads the next bytes, cut anywhere. */
  push(chunk: Uint8Array): void {
    const { lineEnd } = this.layout;
    let from = 0;
    if (this.discarding) {
      from = chunk.indexOf(lineEnd) + 1;
      if (from === 0) return;
      this.discarding = false;
    }
    while (this.carried > 0) {
      // Complete the row begun in an earlier chunk with the next line of this one.
      const end = chunk.indexOf(lineEnd, from);
      this.keep(chunk, from, end < 0 ? chunk.length : end + 1);
      if (end < 0) {
        if (this.carried > LONGEST_ROW_BYTES && this.retryAt === 0) this.giveUpRow(true);
        return;
      }
      from = end + 1;
      if (this.carried >= this.retryAt) this.readCarried();
    }
    const lastEnd = chunk.lastIndexOf(lineEnd);
    const used = lastEnd >= from ? this.read(chunk, from, lastEnd + 1) : from;
    if (used < chunk.length) this.keep(chunk, used, chunk.length);
    if (this.carried > LONGEST_ROW_BYTES && used > lastEnd) this.giveUpRow(true);
  }

  /** Reads what is left as the last row, and hands over the last block. */
  finish(): void {
    if (this.carried > 0) {
      if (this.carry[this.carried - 1] !== this.layout.lineEnd) {
        this.keep(Uint8Array.of(this.layout.lineEnd), 0, 1);
        this.cutShort = true;
      }
      this.readCarried();
      this.quotesMatter = false;
      if (this.carried > 0) this.readCarried();
    }
    this.flush();
  }

  private keep(bytes: Uint8Array, from: number, to: number): void {
    const size = to - from;
    if (this.carried + size > this.carry.length) {
      const larger = new Uint8Array(Math.max(this.carry.length * 2, this.carried + size));
      larger.set(this.carry.subarray(0, this.carried));
      this.carry = larger;
    }
    this.carry.set(bytes.subarray(from, to), this.carried);
    this.carried += size;
  }

  private readCarried(): void {
    const used = this.read(this.carry, 0, this.carried);
    this.carry.copyWithin(0, used, this.carried);
    this.carried -= used;
    // What is left is a row with an open quote. Trying again only when it has doubled keeps the work linear.
    this.retryAt = this.carried * 2;
    if (this.carried > 2 * LONGEST_ROW_BYTES) this.giveUpRow(false);
  }

  private giveUpRow(midLine: boolean): void {
    this.line++;
    this.trouble.endlessRow(this.line);
    this.carried = 0;
    this.retryAt = 0;
    this.discarding = midLine;
  }

  private flush(): void {
    if (this.filled === 0) return;
    const { filled: rows, lines, timesMs, values } = this;
    this.filled = 0;
    this.rows += rows;
    this.onBlock({ rows, lines, timesMs, values });
  }

  /**
   * Reads whole rows from `from` up to `end`, which follows a line end.
   * @returns the first byte not used: `end`, or the start of a row whose quoted cell goes on beyond `end`
   */
  private read(bytes: Uint8Array, from: number, end: number): number {
    const { kinds, lastWanted, values, timesMs, lines, layout } = this;
    const { delimiter, lineEnd } = layout;
    const point = layout.decimalComma ? 44 : 46;
    let at = from;
    while (this.toSkip > 0 && at < end) {
      at = bytes.indexOf(lineEnd, at) + 1;
      this.toSkip--;
      this.line++;
    }
    let row = this.filled;
    while (at < end) {
      const rowStart = at;
      const first = bytes[at];
      if (first === lineEnd || (first === CR && bytes[at + 1] === LF)) {
        at += first === lineEnd ? 1 : 2;
        this.line++;
        continue;
      }
      const lineBefore = this.line++;
      lines[row] = this.line;
      let column = 0;
      let ended = false;
      for (; column <= lastWanted; column++) {
        const kind = kinds[column];
        let byte: number;
        if (kind > 0) {
          let p = at;
          byte = bytes[p];
          const negative = byte === 45;
          if (negative) byte = bytes[++p];
          const digitsFrom = p;
          let whole = 0;
          let decimals = 0;
          byte -= 48;
          while (byte >>> 0 <= 9) {
            whole = (whole * 10 + byte) | 0;
            byte = bytes[++p] - 48;
          }
          let digits = p - digitsFrom;
          if (byte === point - 48 && point !== delimiter) {
            const decimalsFrom = ++p;
            byte = bytes[p] - 48;
            while (byte >>> 0 <= 9) {
              whole = (whole * 10 + byte) | 0;
              byte = bytes[++p] - 48;
            }
            decimals = p - decimalsFrom;
            digits += decimals;
          }
          byte += 48;
          // Up to nine digits fit 32 bits; no digit at all, or anything behind them, is for the slow path.
          if (
            digits > 0 &&
            digits <= 9 &&
            (byte === delimiter || byte === lineEnd || (byte === CR && bytes[p + 1] === LF))
          ) {
            const value = decimals === 0 ? whole : whole / POWERS_OF_TEN[decimals];
            values[kind - 1][row] = negative ? -value : value;
            at = p;
          } else {
            if (!this.slowNumber(bytes, at, end, kind - 1)) {
              this.line = lineBefore;
              this.settle(false);
              this.filled = row;
              return rowStart;
            }
            values[kind - 1][row] = this.cellValue;
            at = this.cellEnd;
            byte = bytes[at];
          }
        } else if (kind === 0) {
          byte = bytes[at];
          if (byte === QUOTE && this.quotesMatter) {
            if (!this.quotedCell(bytes, at, end)) {
              this.line = lineBefore;
              this.settle(false);
              this.filled = row;
              return rowStart;
            }
            at = this.cellEnd;
            byte = bytes[at];
          } else {
            while (byte !== delimiter && byte !== lineEnd) byte = bytes[++at];
          }
        } else {
          if (!this.timeCell(bytes, at, end)) {
            this.line = lineBefore;
            this.settle(false);
            this.filled = row;
            return rowStart;
          }
          timesMs[row] = this.cellValue;
          at = this.cellEnd;
          byte = bytes[at];
        }
        if (byte === delimiter) {
          at++;
        } else {
          ended = true;
          break;
        }
      }
      if (ended) {
        if (column < lastWanted) this.short(row, column, at + 1 >= end);
      } else if (!this.skipRest(bytes, at, end)) {
        this.line = lineBefore;
        this.settle(false);
        this.filled = row;
        return rowStart;
      } else {
        at = this.cellEnd;
      }
      if (bytes[at] === CR && lineEnd === LF) at++;
      at++;
      if (this.complaints.length > 0) this.settle(true);
      if (at - rowStart > LONGEST_ROW_BYTES) this.trouble.endlessRow(this.line);
      else if (++row === BLOCK_ROWS) {
        this.filled = row;
        this.flush();
        row = 0;
      }
    }
    this.filled = row;
    return at;
  }

  /** Keeps a complaint until the row is complete. */
  private complain(about: (line: number) => void): void {
    const { line } = this;
    this.complaints.push(() => about(line));
  }

  private settle(complete: boolean): void {
    if (complete) for (const complaint of this.complaints) complaint();
    this.complaints.length = 0;
  }

  /** Fills the wanted cells a row does not have; `column` is its last one. */
  private short(row: number, column: number, isLast: boolean): void {
    const cut = this.cutShort && isLast;
    // Where a table breaks off, the last cell may have lost its last digits: it is not trusted.
    for (let c = cut ? column : column + 1; c <= this.lastWanted; c++) {
      if (this.kinds[c] > 0) this.values[this.kinds[c] - 1][row] = NaN;
      else if (this.kinds[c] < 0) this.timesMs[row] = NaN;
    }
    this.complain((line) => this.trouble.shortRow(line, cut ? column : column + 1, cut));
  }

  /** Passes over the cells behind the last wanted one, to the line end. */
  private skipRest(bytes: Uint8Array, from: number, end: number): boolean {
    const { delimiter, lineEnd } = this.layout;
    let at = from;
    let byte = bytes[at];
    if (byte === QUOTE && this.quotesMatter) {
      if (!this.quotedCell(bytes, at, end)) return false;
      at = this.cellEnd;
      byte = bytes[at];
    }
    while (byte !== lineEnd) {
      byte = bytes[++at];
      if (byte === QUOTE && bytes[at - 1] === delimiter && this.quotesMatter) {
        if (!this.quotedCell(bytes, at, end)) return false;
        at = this.cellEnd;
        byte = bytes[at];
      }
    }
    this.cellEnd = at > from && lineEnd === LF && bytes[at - 1] === CR ? at - 1 : at;
    return true;
  }

  /**
   * Finds the end of a cell that may be quoted.
   * @returns whether the cell ends before `end`; `cellEnd` is then its delimiter or line end
   */
  private quotedCell(bytes: Uint8Array, from: number, end: number): boolean {
    const { delimiter, lineEnd } = this.layout;
    let at = from;
    if (bytes[at] === QUOTE && this.quotesMatter) {
      this.sawQuote = true;
      const limit = from + LONGEST_QUOTED_BYTES;
      let lines = 0;
      let closed = false;
      at++;
      while (at < end && at < limit && !closed) {
        const byte = bytes[at++];
        if (byte === lineEnd) lines++;
        else if (byte === QUOTE && bytes[at] === QUOTE) at++;
        else if (byte === QUOTE) closed = true;
      }
      if (closed) this.line += lines;
      else if (at < limit) return false;
      else at = from;
    }
    while (bytes[at] !== delimiter && bytes[at] !== lineEnd) at++;
    if (lineEnd === LF && bytes[at] === LF && at > from && bytes[at - 1] === CR) at--;
    this.cellEnd = at;
    return true;
  }

  /** The text of the cell from `from` to `cellEnd`, quotes removed. */
  private cellText(bytes: Uint8Array, from: number): string {
    const text = logText(bytes, from, this.cellEnd).trim();
    if (text.length < 2 || !text.startsWith('"') || !text.endsWith('"')) return text;
    return text.slice(1, -1).replaceAll('""', '"');
  }

  private slowNumber(bytes: Uint8Array, from: number, end: number, place: number): boolean {
    if (!this.quotedCell(bytes, from, end)) return false;
    if (this.manyDigits(bytes, from)) return true;
    const text = this.cellText(bytes, from);
    const value = parseLoadText(text, this.layout.decimalComma);
    if (value === null) this.complain((line) => this.trouble.unreadableCell(place, line, text));
    this.cellValue = value ?? NaN;
    return true;
  }

  /** Numbers of 10 to 15 digits without exponent: still exact in a double before the one division. */
  private manyDigits(bytes: Uint8Array, from: number): boolean {
    const point = this.layout.decimalComma ? 44 : 46;
    let at = from;
    while (bytes[at] === 32) at++;
    const negative = bytes[at] === 45;
    if (negative || bytes[at] === 43) at++;
    let digits = 0;
    let decimals = -1;
    let whole = 0;
    for (; at < this.cellEnd; at++) {
      const digit = bytes[at] - 48;
      if (digit >= 0 && digit <= 9) {
        whole = whole * 10 + digit;
        digits++;
        if (decimals >= 0) decimals++;
      } else if (bytes[at] === point && decimals < 0) {
        decimals = 0;
      } else {
        return false;
      }
    }
    if (digits === 0 || digits > 15) return false;
    const value = decimals > 0 ? whole / POWERS_OF_TEN[decimals] : whole;
    if (value > LARGEST_READABLE_LOAD) return false;
    this.cellValue = negative ? -value : value;
    return true;
  }

  private timeCell(bytes: Uint8Array, from: number, end: number): boolean {
    const time = this.layout.time!;
    if (time.format === 'iso' && this.isoTime(bytes, from, time.naiveOffsetMinutes)) return true;
    if (!this.quotedCell(bytes, from, end)) return false;
    if (time.format !== 'iso' && this.manyDigits(bytes, from)) {
      if (time.format === 'epoch-s') this.cellValue *= 1000;
      if (isReadableInstant(this.cellValue)) return true;
    }
    const text = this.cellText(bytes, from);
    const parsed = parseTimeText(text, time.format);
    if (parsed === null) {
      this.complain((line) => this.trouble.unreadableTime(line, text));
      this.cellValue = NaN;
    } else {
      this.cellValue = parsed.ms - (parsed.hasOffset ? 0 : time.naiveOffsetMinutes * 60_000);
    }
    return true;
  }

  /** `YYYY-MM-DDThh:mm:ss[.fff][Z]` on the date last met; everything else is for the slow path. */
  private isoTime(bytes: Uint8Array, from: number, naiveOffsetMinutes: number): boolean {
    const { date } = this;
    let same = this.dateMs === this.dateMs;
    for (let i = 9; same && i >= 0; i--) same = bytes[from + i] === date[i];
    if (!same && !this.newDate(bytes, from)) return false;
    const separator = bytes[from + 10];
    if ((separator !== 84 && separator !== 32) || bytes[from + 13] !== 58 || bytes[from + 16] !== 58)
      return false;
    const h1 = bytes[from + 11] - 48;
    const h2 = bytes[from + 12] - 48;
    const m1 = bytes[from + 14] - 48;
    const m2 = bytes[from + 15] - 48;
    const s1 = bytes[from + 17] - 48;
    const s2 = bytes[from + 18] - 48;
    if (h1 >>> 0 > 2 || h2 >>> 0 > 9 || m1 >>> 0 > 5 || m2 >>> 0 > 9 || s1 >>> 0 > 5 || s2 >>> 0 > 9)
      return false;
    const hour = h1 * 10 + h2;
    if (hour > 23) return false;
    let ms = ((hour * 60 + m1 * 10 + m2) * 60 + s1 * 10 + s2) * 1000;
    let at = from + 19;
    let byte = bytes[at];
    if (byte === 46) {
      const fractionFrom = ++at;
      let fraction = 0;
      byte = bytes[at] - 48;
      while (byte >>> 0 <= 9) {
        fraction = (fraction * 10 + byte) | 0;
        byte = bytes[++at] - 48;
      }
      byte += 48;
      const digits = at - fractionFrom;
      if (digits === 0 || digits > 9) return false;
      ms += digits === 3 ? fraction : (fraction * 1000) / POWERS_OF_TEN[digits];
    }
    if (byte === 90) {
      byte = bytes[++at];
    } else if (byte === 43 || byte === 45) {
      const hours = twoDigits(bytes, at + 1);
      const minutes = twoDigits(bytes, at + 4);
      if (bytes[at + 3] !== 58 || hours < 0 || minutes < 0) return false;
      ms -= (byte === 45 ? -1 : 1) * (hours * 60 + minutes) * 60_000;
      at += 6;
      byte = bytes[at];
    } else {
      ms -= naiveOffsetMinutes * 60_000;
    }
    const { delimiter, lineEnd } = this.layout;
    if (byte !== delimiter && byte !== lineEnd && (byte !== CR || bytes[at + 1] !== LF)) return false;
    this.cellEnd = at;
    this.cellValue = this.dateMs + ms;
    return true;
  }

  private newDate(bytes: Uint8Array, from: number): boolean {
    for (let i = 0; i < 10; i++) {
      const digit = bytes[from + i] - 48;
      if (i === 4 || i === 7 ? bytes[from + i] !== 45 : digit >>> 0 > 9) return false;
    }
    const digits = (at: number, size: number) => {
      let value = 0;
      for (let i = 0; i < size; i++) value = value * 10 + bytes[from + at + i] - 48;
      return value;
    };
    const dateMs = dateToMs(digits(0, 4), digits(5, 2), digits(8, 2));
    if (dateMs === null || !isReadableInstant(dateMs)) return false;
    this.date.set(bytes.subarray(from, from + 10));
    this.dateMs = dateMs;
    return true;
  }
}

/** The number two digits make; below 0 when they are none. */
function twoDigits(bytes: Uint8Array, at: number): number {
  const tens = bytes[at] - 48;
  const units = bytes[at + 1] - 48;
  return tens >>> 0 <= 9 && units >>> 0 <= 9 ? tens * 10 + units : -1;
}

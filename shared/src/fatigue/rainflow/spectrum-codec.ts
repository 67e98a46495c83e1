import type { CycleTable, DayCycles, LoadSpectrum } from './load-spectrum.js';

const VERSION = 1;
const WHOLE_LEVELS = 1;
const RAW_LOADS = 0;
const CHECK_BYTES = 4;

/** Stored bytes that are no load spectrum: cut, changed or of another version. */
export class SpectrumFormatError extends Error {
  override name = 'SpectrumFormatError';
}

/**
 * A load spectrum as bytes, for storing. Equal spectra give equal bytes, so a hash of them identifies the count.
 *
 * Layout: version byte; byte 1 for whole levels or 0 for raw loads; step (double, little endian); samples;
 * turning points; residue length, its values and its days; number of days, and for each its day, number of bins
 * and bins; CRC-32 of all before. Whole numbers are written seven bits a byte, lowest first; signed ones and
 * differences to the one before in zigzag. A bin takes the growth of its low, its range (or the growth of its
 * high while the low stays) and its count: three to four bytes for an ordinary day.
 *
 * @throws RangeError when a count is no whole number
 */
export function encodeSpectrum(spectrum: LoadSpectrum): Uint8Array {
  const { step, days, residue, residueDay } = spectrum;
  const whole = hasWholeLevels(spectrum);
  const out = new ByteWriter();
  out.byte(VERSION);
  out.byte(whole ? WHOLE_LEVELS : RAW_LOADS);
  out.double(step);
  out.whole(spectrum.samples);
  out.whole(spectrum.turningPoints);
  out.whole(residue.length);
  let previous = 0;
  for (const load of residue) {
    if (whole) out.signed(load - previous);
    else out.double(load);
    previous = load;
  }
  let previousDay = 0;
  for (const day of residueDay) {
    out.signed(day - previousDay);
    previousDay = day;
  }
  out.whole(days.length);
  previousDay = 0;
  for (const { day, cycles } of days) {
    out.signed(day - previousDay);
    previousDay = day;
    writeCycles(out, cycles, whole);
  }
  return out.finish();
}

/**
 * The load spectrum written by `encodeSpectrum`.
 *
 * @throws SpectrumFormatError when the bytes are cut short, changed, or of a version this engine does not know
 */
export function decodeSpectrum(bytes: Uint8Array): LoadSpectrum {
  if (bytes.length === 0) throw new SpectrumFormatError('the stored spectrum is empty');
  if (bytes[0] !== VERSION) {
    throw new SpectrumFormatError(
      `the stored spectrum has version ${bytes[0]}, this engine reads version ${VERSION}`,
    );
  }
  const end = bytes.length - CHECK_BYTES;
  if (end < 1) throw new SpectrumFormatError('the stored spectrum is cut short');
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  if (view.getUint32(end, true) !== crc32(bytes, end)) {
    throw new SpectrumFormatError('the stored spectrum is cut short or changed: its check sum does not fit');
  }
  const input = new ByteReader(view, 1, end);
  const kind = input.byte();
  if (kind !== WHOLE_LEVELS && kind !== RAW_LOADS) input.fail('unknown kind of levels');
  const whole = kind === WHOLE_LEVELS;
  const step = input.double();
  if (!(step >= 0)) input.fail('the step is no number');
  const samples = input.whole();
  const turningPoints = input.whole();
  const residue = new Float64Array(input.length(whole ? 2 : 9));
  let previous = 0;
  for (let i = 0; i < residue.length; i++) {
    previous = whole ? previous + input.signed() : input.double();
    residue[i] = previous;
  }
  const residueDay = new Int32Array(residue.length);
  let day = 0;
  for (let i = 0; i < residueDay.length; i++) residueDay[i] = day += input.signed();
  const days: DayCycles[] = new Array(input.length(2));
  day = 0;
  for (let i = 0; i < days.length; i++) {
    const growth = input.signed();
    if (i > 0 && growth <= 0) input.fail('days out of order');
    day += growth;
    days[i] = { day, cycles: readCycles(input, whole) };
  }
  input.expectEnd();
  return { step, days, residue, residueDay, samples, turningPoints };
}

function hasWholeLevels({ step, days, residue }: LoadSpectrum): boolean {
  if (step === 0) return false;
  for (const level of residue) if (!Number.isSafeInteger(level)) return false;
  for (const { cycles } of days) {
    for (const level of cycles.low) if (!Number.isSafeInteger(level)) return false;
    for (const level of cycles.high) if (!Number.isSafeInteger(level)) return false;
  }
  return true;
}

function writeCycles(out: ByteWriter, { low, high, count }: CycleTable, whole: boolean): void {
  const size = count.length;
  out.whole(size);
  let previousLow = 0;
  let previousHigh = 0;
  for (let i = 0; i < size; i++) {
    if (whole) {
      if (i === 0) out.signed(low[i]);
      else out.whole(low[i] - previousLow);
      out.whole(i > 0 && low[i] === previousLow ? high[i] - previousHigh : high[i] - low[i]);
    } else {
      out.double(low[i]);
      out.double(high[i]);
    }
    out.whole(count[i]);
    previousLow = low[i];
    previousHigh = high[i];
  }
}

function readCycles(input: ByteReader, whole: boolean): CycleTable {
  const size = input.length(whole ? 3 : 17);
  const low = new Float64Array(size);
  const high = new Float64Array(size);
  const count = new Float64Array(size);
  let previousLow = 0;
  let previousHigh = 0;
  for (let i = 0; i < size; i++) {
    if (whole) {
      const growth = i === 0 ? input.signed() : input.whole();
      const sameLow = i > 0 && growth === 0;
      previousLow = previousLow + growth;
      previousHigh = input.whole() + (sameLow ? previousHigh : previousLow);
    } else {
      previousLow = input.double();
      previousHigh = input.double();
    }
    low[i] = previousLow;
    high[i] = previousHigh;
    count[i] = input.whole();
    const ordered = i === 0 || low[i] > low[i - 1] || (low[i] === low[i - 1] && high[i] > high[i - 1]);
    if (!ordered || !(high[i] > low[i])) input.fail('cycles out of order');
  }
  return { low, high, count };
}

class ByteWriter {
  private bytes = new Uint8Array(1024);
  private view = new DataView(this.bytes.buffer);
  private at = 0;

  byte(value: number): void {
    this.room(1);
    this.bytes[this.at++] = value;
  }

  double(value: number): void {
    this.room(8);
    // Adding zero turns -0 into 0: equal loads, equal bytes.
    this.view.setFloat64(this.at, value + 0, true);
    this.at += 8;
  }

  whole(value: number): void {
    if (!Number.isSafeInteger(value) || value < 0) {
      throw new RangeError(`${value} is no whole number from 0 to 2^53 - 1`);
    }
    this.room(8);
    let rest = value;
    while (rest >= 0x80) {
      // Remainder and division instead of bit operations: values may exceed 32 bits.
      this.bytes[this.at++] = (rest % 0x80) | 0x80;
      rest = Math.floor(rest / 0x80);
    }
    this.bytes[this.at++] = rest;
  }

  /** Zigzag by hand, in two parts: the sign in the lowest bit of the first byte. */
  signed(value: number): void {
    const size = Math.abs(value);
    const sign = value < 0 ? 1 : 0;
    const first = size % 0x40;
    const rest = Math.floor(size / 0x40);
    this.byte((first << 1) | sign | (rest > 0 ? 0x80 : 0));
    if (rest > 0) this.whole(rest);
  }

  finish(): Uint8Array {
    this.room(CHECK_BYTES);
    this.view.setUint32(this.at, crc32(this.bytes, this.at), true);
    return this.bytes.slice(0, this.at + CHECK_BYTES);
  }

  private room(size: number): void {
    if (this.at + size <= this.bytes.length) return;
    const bytes = new Uint8Array(this.bytes.length * 2);
    bytes.set(this.bytes);
    this.bytes = bytes;
    this.view = new DataView(bytes.buffer);
  }
}

class ByteReader {
  constructor(
    private readonly view: DataView,
    private at: number,
    private readonly end: number,
  ) {}

  byte(): number {
    if (this.at >= this.end) this.fail('it ends too early');
    return this.view.getUint8(this.at++);
  }

  double(): number {
    if (this.at + 8 > this.end) this.fail('it ends too early');
    const value = this.view.getFloat64(this.at, true);
    this.at += 8;
    if (!Number.isFinite(value)) this.fail('a load is no number');
    return value;
  }

  whole(): number {
    let value = 0;
    let weight = 1;
    for (;;) {
      const byte = this.byte();
      value += (byte & 0x7f) * weight;
      if (byte < 0x80) break;
      weight *= 0x80;
      if (weight > 2 ** 49) this.fail('a number is too long');
    }
    if (!Number.isSafeInteger(value)) this.fail('a number is too large');
    return value;
  }

  signed(): number {
    const byte = this.byte();
    let size = (byte & 0x7f) >> 1;
    if (byte >= 0x80) size += this.whole() * 0x40;
    return (byte & 1) === 1 ? 0 - size : size;
  }

  /** A number of items that must still fit into the bytes left, so that a changed one cannot ask for memory. */
  length(leastBytesEach: number): number {
    const value = this.whole();
    if (value * leastBytesEach > this.end - this.at) this.fail('it ends too early');
    return value;
  }

  expectEnd(): void {
    if (this.at !== this.end) this.fail('something follows its end');
  }

  fail(what: string): never {
    throw new SpectrumFormatError(`the stored spectrum is damaged at byte ${this.at}: ${what}`);
  }
}

let crcTable: Uint32Array | null = null;

/** CRC-32 as in ISO 3309 (polynomial 0xEDB88320, reflected). */
function crc32(bytes: Uint8Array, end: number): number {
  if (crcTable === null) {
    crcTable = new Uint32Array(256);
    for (let n = 0; n < 256; n++) {
      let value = n;
      for (let bit = 0; bit < 8; bit++) value = value & 1 ? (value >>> 1) ^ 0xedb88320 : value >>> 1;
      crcTable[n] = value;
    }
  }
  let sum = 0xffffffff;
  for (let i = 0; i < end; i++) sum = crcTable[(sum ^ bytes[i]) & 0xff] ^ (sum >>> 8);
  return (sum ^ 0xffffffff) >>> 0;
}

import { ByteReader } from './byte-reader.js';
import { ByteWriter } from './byte-writer.js';
import { crc32 } from './crc32.js';
import { readCycles, writeCycles } from './cycle-codec.js';
import type { DayCycles, LoadSpectrum } from './load-spectrum.js';
import { SpectrumFormatError } from './spectrum-format-error.js';

/** Used for one spectrum after the other: memory taken for each would pile up faster than it is collected. */
const out = new ByteWriter();

const VERSION = 1;
const WHOLE_LEVELS = 1;
const RAW_LOADS = 0;
const CHECK_BYTES = 4;

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
  const whole = hasWholeLevels(spectrum);
  const days = spectrum.days.map(({ day, cycles }) => ({
    day,
    write: () => writeCycles(out, cycles, whole),
  }));
  return encodeParts({ ...spectrum, days }, whole);
}

/** A spectrum whose days write their cycles themselves. */
export interface SpectrumParts extends Omit<LoadSpectrum, 'days'> {
  days: { day: number; write: (out: ByteWriter) => void }[];
}

/**
 * As `encodeSpectrum`, for whoever has the cycles in another form.
 *
 * @param whole whether all levels are whole numbers; the days must write accordingly
 */
export function encodeParts(parts: SpectrumParts, whole: boolean): Uint8Array {
  const { step, days, residue, residueDay } = parts;
  out.clear();
  out.byte(VERSION);
  out.byte(whole ? WHOLE_LEVELS : RAW_LOADS);
  out.double(step);
  out.whole(parts.samples);
  out.whole(parts.turningPoints);
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
  for (const { day, write } of days) {
    out.signed(day - previousDay);
    previousDay = day;
    write(out);
  }
  out.checkSum();
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

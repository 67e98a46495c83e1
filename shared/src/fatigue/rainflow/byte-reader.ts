import { SpectrumFormatError } from './spectrum-format-error.js';

/** Reads what `ByteWriter` wrote, and refuses what cannot have been written by it. */
export class ByteReader {
  constructor(
    private readonly view: DataView,
    private at: number,
    private readonly end: number,
  ) {}

  /** One byte. */
  byte(): number {
    if (this.at >= this.end) this.fail('it ends too early');
    return this.view.getUint8(this.at++);
  }

  /** A finite double. */
  double(): number {
    if (this.at + 8 > this.end) this.fail('it ends too early');
    const value = this.view.getFloat64(this.at, true);
    this.at += 8;
    if (!Number.isFinite(value)) this.fail('a load is no number');
    return value;
  }

  /** A whole number from 0 on. */
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

  /** A whole number of either sign. */
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

  /** Fails unless everything was read. */
  expectEnd(): void {
    if (this.at !== this.end) this.fail('something follows its end');
  }

  /** Refuses the bytes. */
  fail(what: string): never {
    throw new SpectrumFormatError(`the stored spectrum is damaged at byte ${this.at}: ${what}`);
  }
}

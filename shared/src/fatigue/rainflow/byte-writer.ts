import { crc32 } from './crc32.js';

/** Writes numbers as bytes, as `encodeSpectrum` lays them out. */
export class ByteWriter {
  private bytes = new Uint8Array(1024);
  private view = new DataView(this.bytes.buffer);
  private at = 0;

  /** Begins again, keeping the memory. */
  clear(): void {
    this.at = 0;
  }

  /** One byte. */
  byte(value: number): void {
    this.room(1);
    this.bytes[this.at++] = value;
  }

  /** A double, eight bytes, little endian. */
  double(value: number): void {
    this.room(8);
    // Adding zero turns -0 into 0: equal loads, equal bytes.
    this.view.setFloat64(this.at, value + 0, true);
    this.at += 8;
  }

  /** A whole number from 0 on, seven bits a byte, lowest first. */
  whole(value: number): void {
    if (this.at + 8 > this.bytes.length) this.room(8);
    if (value >= 0 && value < 0x80 && (value | 0) === value) {
      this.bytes[this.at++] = value;
      return;
    }
    if (!Number.isSafeInteger(value) || value < 0) {
      throw new RangeError(`${value} is no whole number from 0 to 2^53 - 1`);
    }
    let rest = value;
    while (rest >= 0x80) {
      // Remainder and division instead of bit operations: values may exceed 32 bits.
      this.bytes[this.at++] = (rest % 0x80) | 0x80;
      rest = Math.floor(rest / 0x80);
    }
    this.bytes[this.at++] = rest;
  }

  /** A whole number of either sign: the sign in the lowest bit of the first byte. */
  signed(value: number): void {
    const size = Math.abs(value);
    const sign = value < 0 ? 1 : 0;
    const first = size % 0x40;
    const rest = Math.floor(size / 0x40);
    this.byte((first << 1) | sign | (rest > 0 ? 0x80 : 0));
    if (rest > 0) this.whole(rest);
  }

  /** Bytes written elsewhere. */
  append(bytes: Uint8Array): void {
    this.room(bytes.length);
    this.bytes.set(bytes, this.at);
    this.at += bytes.length;
  }

  /** Ends with a check sum of all before. */
  checkSum(): void {
    this.room(4);
    this.view.setUint32(this.at, crc32(this.bytes, this.at), true);
    this.at += 4;
  }

  /** The bytes written. */
  finish(): Uint8Array {
    return this.bytes.slice(0, this.at);
  }

  private room(size: number): void {
    if (this.at + size <= this.bytes.length) return;
    const bytes = new Uint8Array(Math.max(this.bytes.length * 2, this.at + size));
    bytes.set(this.bytes);
    this.bytes = bytes;
    this.view = new DataView(bytes.buffer);
  }
}

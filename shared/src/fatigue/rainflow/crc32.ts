let crcTable: Uint32Array | null = null;

/** CRC-32 of the first `end` bytes, as in ISO 3309 (polynomial 0xEDB88320, reflected). */
export function crc32(bytes: Uint8Array, end: number): number {
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

import type { Envelope } from '@stayledger/shared/fatigue/load-history/load-log';

const VERSION = 1;
const HEADER_BYTES = 1 + 8 + 8 + 4;

/**
 * An envelope as bytes: version, bucket length, start, number of buckets, lowest loads, highest loads. Loads are
 * stored as 32-bit floats: they are for pictures, seven digits are plenty.
 */
export function encodeEnvelope(envelope: Envelope): Buffer {
  const count = envelope.minKn.length;
  const bytes = Buffer.alloc(HEADER_BYTES + 8 * count);
  bytes.writeUInt8(VERSION, 0);
  bytes.writeDoubleLE(envelope.bucketMs, 1);
  bytes.writeDoubleLE(envelope.fromMs, 9);
  bytes.writeUInt32LE(count, 17);
  for (let i = 0; i < count; i++) {
    bytes.writeFloatLE(envelope.minKn[i], HEADER_BYTES + 4 * i);
    bytes.writeFloatLE(envelope.maxKn[i], HEADER_BYTES + 4 * (count + i));
  }
  return bytes;
}

/** @throws RangeError for bytes of another version or length */
export function decodeEnvelope(bytes: Buffer): Envelope {
  const count = bytes.length >= HEADER_BYTES && bytes.readUInt8(0) === VERSION ? bytes.readUInt32LE(17) : -1;
  if (bytes.length !== HEADER_BYTES + 8 * count) throw new RangeError('The stored envelope is damaged.');
  const minKn = new Float64Array(count);
  const maxKn = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    minKn[i] = bytes.readFloatLE(HEADER_BYTES + 4 * i);
    maxKn[i] = bytes.readFloatLE(HEADER_BYTES + 4 * (count + i));
  }
  return { bucketMs: bytes.readDoubleLE(1), fromMs: bytes.readDoubleLE(9), minKn, maxKn };
}

/** Points of a trace, as the contract sends them: extremes between `atMs[i]` and the next instant. */
export interface TracePoints {
  atMs: number[];
  lowKn: number[];
  highKn: number[];
}

/** At most so many points, each the extremes of neighbouring buckets; stretches without samples are left out. */
export function traceOf(envelope: Envelope, maxPoints: number): TracePoints {
  const count = envelope.minKn.length;
  const merged = Math.max(1, Math.ceil(count / maxPoints));
  const points: TracePoints = { atMs: [], lowKn: [], highKn: [] };
  for (let from = 0; from < count; from += merged) {
    let low = Infinity;
    let high = -Infinity;
    for (let i = from; i < Math.min(from + merged, count); i++) {
      if (Number.isNaN(envelope.minKn[i])) continue;
      low = Math.min(low, envelope.minKn[i]);
      high = Math.max(high, envelope.maxKn[i]);
    }
    if (low > high) continue;
    points.atMs.push(envelope.fromMs + from * envelope.bucketMs);
    points.lowKn.push(low);
    points.highKn.push(high);
  }
  return points;
}

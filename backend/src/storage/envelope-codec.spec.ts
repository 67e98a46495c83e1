import { decodeEnvelope, encodeEnvelope, traceOf } from './envelope-codec.js';

const envelope = {
  bucketMs: 1000,
  fromMs: 1_780_000_000_000,
  minKn: Float64Array.of(1, NaN, 3, 4, 0.5),
  maxKn: Float64Array.of(2, NaN, 9, 5, 6),
};

describe('envelope codec', () => {
  it('gives back what went in', () => {
    expect(decodeEnvelope(encodeEnvelope(envelope))).toEqual(envelope);
  });

  it('refuses bytes that were cut or are of another version', () => {
    const bytes = encodeEnvelope(envelope);
    expect(() => decodeEnvelope(bytes.subarray(0, bytes.length - 1))).toThrow('damaged');
    expect(() => decodeEnvelope(Buffer.from([2, ...bytes.subarray(1)]))).toThrow('damaged');
    expect(() => decodeEnvelope(Buffer.alloc(0))).toThrow('damaged');
  });
});

describe('traceOf', () => {
  it('keeps every extreme however few points are asked for', () => {
    const points = traceOf(envelope, 2);
    // Three buckets a point: (1..2, none, 3..9) and (4..5, 0.5..6).
    expect(points).toEqual({
      atMs: [1_780_000_000_000, 1_780_000_003_000],
      lowKn: [1, 0.5],
      highKn: [9, 6],
    });
  });

  it('leaves out stretches without samples', () => {
    expect(traceOf(envelope, 10).atMs).toHaveLength(4);
  });
});

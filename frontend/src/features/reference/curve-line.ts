import type { CurveDto } from '@stayledger/shared/contracts/curves';

/** A curve as a person states it: one point and a slope, and a second slope below a knee. */
export interface CurveLine {
  /** Range the curve allows at two million cycles. */
  rangeAtTwoMillion: number;
  slope: number;
  /** Cycles at the knee, and the slope below it; null for one straight line. */
  knee: { cycles: number; slope: number } | null;
}

const LOG_TWO_MILLION = Math.log10(2e6);

/** Segments of the line: log10 a = log10 N + m log10 S at the stated point, and at the knee for the second. */
export function segmentsOfLine({ rangeAtTwoMillion, slope, knee }: CurveLine): CurveDto['segments'] {
  const log10a = LOG_TWO_MILLION + slope * Math.log10(rangeAtTwoMillion);
  if (knee === null) return [{ above: 0, m: slope, log10a }];
  const logRange = (log10a - Math.log10(knee.cycles)) / slope;
  return [
    { above: 10 ** logRange, m: slope, log10a },
    { above: 0, m: knee.slope, log10a: Math.log10(knee.cycles) + knee.slope * logRange },
  ];
}

/**
 * The line behind segments, for correcting a curve; null where they say more than a line with one knee can. The point is
 * taken on the first slope, carried on where the knee lies above it.
 */
export function lineOfSegments(segments: CurveDto['segments']): CurveLine | null {
  const [first, second, ...more] = segments;
  const last = second ?? first;
  if (more.length > 0 || last.above !== 0) return null;
  return {
    rangeAtTwoMillion: 10 ** ((first.log10a - LOG_TWO_MILLION) / first.m),
    slope: first.m,
    knee: second
      ? { cycles: 10 ** (first.log10a - first.m * Math.log10(first.above)), slope: second.m }
      : null,
  };
}

import { cyclesToFailure } from '@stayledger/shared/fatigue/curves/cycles-to-failure';
import { describe, expect, it } from 'vitest';
import { lineOfSegments, segmentsOfLine } from './curve-line';

describe('segmentsOfLine', () => {
  it('passes through the stated point with the stated slope', () => {
    const curve = { segments: segmentsOfLine({ rangeAtTwoMillion: 80, slope: 5, knee: null }) };
    expect(cyclesToFailure(curve, 80) / 2e6).toBeCloseTo(1, 9);
    // Twice the range, slope 5: 2^5 = 32 times fewer cycles.
    expect(cyclesToFailure(curve, 160) / (2e6 / 32)).toBeCloseTo(1, 9);
  });

  it('meets itself at the knee and falls with the second slope below it', () => {
    const line = { rangeAtTwoMillion: 71, slope: 3, knee: { cycles: 5e6, slope: 5 } };
    const [upper, lower] = segmentsOfLine(line);
    // By hand: 71 (2/5)^(1/3) = 52.3, the constant amplitude limit of category 71 in EN 1993-1-9.
    expect(upper.above).toBeCloseTo(52.3, 1);
    const cycles = ({ m, log10a }: typeof upper, range: number) => 10 ** (log10a - m * Math.log10(range));
    expect(cycles(upper, upper.above) / 5e6).toBeCloseTo(1, 9);
    expect(cycles(lower, upper.above) / 5e6).toBeCloseTo(1, 9);
    expect(cycles(lower, upper.above / 2) / (5e6 * 32)).toBeCloseTo(1, 9);
  });
});

describe('lineOfSegments', () => {
  it.each([null, { cycles: 5e6, slope: 5 }])('gives back the line it came from (knee %o)', (knee) => {
    const back = lineOfSegments(segmentsOfLine({ rangeAtTwoMillion: 71, slope: 3, knee }));
    expect(back?.rangeAtTwoMillion).toBeCloseTo(71, 9);
    expect(back?.slope).toBe(3);
    expect(back?.knee?.slope).toBe(knee?.slope);
    if (knee) expect((back?.knee?.cycles ?? 0) / knee.cycles).toBeCloseTo(1, 9);
  });

  it('gives up on three slopes and on a cut-off', () => {
    const one = { m: 3, log10a: 12 };
    expect(
      lineOfSegments([
        { above: 50, ...one },
        { above: 20, ...one },
        { above: 0, ...one },
      ]),
    ).toBeNull();
    expect(lineOfSegments([{ above: 20, ...one }])).toBeNull();
  });
});

import type { Curve } from './curve.js';

/**
 * What is wrong with a curve somebody wrote down, one sentence each; an empty list means it can be used.
 * Asked of curves from outside (configuration files, a firm's own curves); reference data are tested once for all.
 */
export function curveProblems(curve: Curve): string[] {
  const problems: string[] = [];
  const { segments } = curve;
  if (segments.length === 0) problems.push('A curve needs at least one segment.');
  segments.forEach(({ above, m, log10a }, index) => {
    const place = `Segment ${index + 1}`;
    if (!(above >= 0 && above < Infinity))
      problems.push(`${place}: "above" must be zero or more, not ${above}.`);
    if (!(m > 0 && m < Infinity)) problems.push(`${place}: the slope m must be above zero, not ${m}.`);
    if (!Number.isFinite(log10a)) problems.push(`${place}: log10a must be a number, not ${log10a}.`);
    if (index > 0 && !(above < segments[index - 1].above)) {
      problems.push(`${place}: segments must run from high to low ranges.`);
    }
  });
  return problems;
}

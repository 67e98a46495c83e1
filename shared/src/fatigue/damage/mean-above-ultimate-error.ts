/** A cycle's mean reaches the strength its mean-load rule compares it with: no life can be stated. */
export class MeanAboveUltimateError extends Error {
  override readonly name = 'MeanAboveUltimateError';

  /**
   * @param mean mean of the cycle, in the measure of the curve
   * @param limit strength it was compared with, same measure
   */
  constructor(
    readonly mean: number,
    readonly limit: number,
  ) {
    super(
      `A counted mean of ${mean} is at or above the ultimate strength ${limit}; this detail cannot be assessed.`,
    );
  }
}

/** A mean-load rule was asked for on a curve whose tests already contain the mean. */
export class MeanRuleRefusedError extends Error {
  override readonly name = 'MeanRuleRefusedError';

  /**
   * @param curveId curve that refuses
   * @param rule kind of rule asked for
   * @param reason why, in the words of the curve's record
   */
  constructor(
    readonly curveId: string,
    readonly rule: string,
    reason: string,
  ) {
    super(`A ${rule} term cannot be set on the curve ${curveId}: ${reason}`);
  }
}

/**
 * Probability of having failed at which a part is to be replaced: 1 % where its loss drops the mast, 5 % otherwise.
 * Engineering choices without a source; a firm may set its own.
 */
export function targetProbability(lossDropsMast: boolean): number {
  return lossDropsMast ? 0.01 : 0.05;
}

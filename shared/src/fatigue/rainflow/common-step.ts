/**
 * The coarsest grid that holds every level of two grids: the finer step when it divides the coarser one,
 * their greatest common divisor as decimals otherwise, and 0 (no grid) when either is 0.
 *
 * @param stepOne grid in load units, 0 for none
 * @param stepTwo grid in load units, 0 for none
 * @example commonStep(0.1, 0.02) // 0.02
 * @example commonStep(0.05, 0.02) // 0.01
 */
export function commonStep(stepOne: number, stepTwo: number): number {
  if (stepOne === stepTwo) return stepOne;
  if (stepOne === 0 || stepTwo === 0) return 0;
  const one = decimalOf(stepOne);
  const two = decimalOf(stepTwo);
  const exponent = Math.min(one.exponent, two.exponent);
  let a = one.digits * 10n ** BigInt(one.exponent - exponent);
  let b = two.digits * 10n ** BigInt(two.exponent - exponent);
  while (b !== 0n) [a, b] = [b, a % b];
  return Number(`${a}e${exponent}`);
}

/** The shortest decimal that reads back as the same number, as digits times a power of ten. */
function decimalOf(value: number): { digits: bigint; exponent: number } {
  const [mantissa, power] = value.toExponential().split('e');
  const [whole, fraction = ''] = mantissa.split('.');
  return { digits: BigInt(whole + fraction), exponent: Number(power) - fraction.length };
}

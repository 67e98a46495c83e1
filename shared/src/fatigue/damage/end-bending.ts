/**
 * Extra outer-fibre stress where a stay's fixed end is turned against the stay's line: 2 * angle * sqrt(E * stress).
 * Tension beam with its end clamped; it holds for a round bar and for a bundle of wires that slip freely.
 *
 * @param angleRad angle between end and stay, radians (its sign does not matter)
 * @param youngMpa Young's modulus of the stay, MPa
 * @param stressMpa tensile stress, MPa; a slack stay (zero or less) does not bend its end
 * @returns bending stress, MPa
 * Source: derivation from the tension beam; known in this form in stay-cable literature (fib bulletins 30 and 89,
 * from memory).
 */
export function endBendingStressMpa(angleRad: number, youngMpa: number, stressMpa: number): number {
  return stressMpa > 0 ? 2 * Math.abs(angleRad) * Math.sqrt(youngMpa * stressMpa) : 0;
}

/** The force units a load log may be written in. `tf` is the metric tonne-force (1000 kgf). */
export type ForceUnit = 'kN' | 'N' | 'kgf' | 'daN' | 'lbf' | 'tf';

/**
 * Kilonewtons in one of each unit.
 *
 * Source: SI; standard gravity 9.80665 m/s² and the international pound 0.45359237 kg are exact by
 * definition, so every factor here is exact in decimals (1 lbf = 4.4482216152605 N).
 */
export const KN_PER: Readonly<Record<ForceUnit, number>> = {
  kN: 1,
  N: 0.001,
  kgf: 0.00980665,
  daN: 0.01,
  lbf: 0.0044482216152605,
  tf: 9.80665,
};

/** Every force unit, in the order they are offered to people. */
export const FORCE_UNITS: readonly ForceUnit[] = ['kN', 'N', 'kgf', 'daN', 'lbf', 'tf'];

/** Whether a text is one of the force units, spelled exactly. */
export function isForceUnit(text: string): text is ForceUnit {
  return Object.hasOwn(KN_PER, text);
}

/**
 * A force in kilonewtons.
 *
 * Newtons and decanewtons are divided by a whole number instead of multiplied by its inexact inverse,
 * so that 12345 N is the double nearest to 12.345 kN and not its neighbour.
 *
 * @param value force in `unit`
 * @returns force in kN
 * @example toKn(12345, 'N') // 12.345
 */
export function toKn(value: number, unit: ForceUnit): number {
  if (unit === 'kN') return value;
  if (unit === 'N') return value / 1000;
  if (unit === 'daN') return value / 100;
  return value * KN_PER[unit];
}

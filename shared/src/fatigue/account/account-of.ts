import { CompensatedSum } from '../damage/compensated-sum.js';
import { damageOfSpectrum, type SpectrumDamage } from '../damage/damage-of-spectrum.js';
import type { DetailModel } from '../damage/detail-model.js';
import { closedCycles } from './closed-cycles.js';
import { cyclesBetweenLogs } from './cycles-between-logs.js';
import type { LogOfAccount } from './log-of-account.js';

/** The account of one detail: what each log recorded, and what closed between them. Damage by the design curve. */
export interface DetailAccount {
  recorded: Map<string, number>;
  betweenLogs: number;
  /** recorded + betweenLogs: the damage of the whole history as one. */
  total: number;
}

/**
 * Amounts of the account of one detail after a set of logs, the same to the last bit whatever order they came in.
 * `total` is the Miner sum of the ASTM E1049-85 count (closed cycles as 1, residue pairs as one half) of the whole
 * history from the slack part on, because spectra of neighbouring stretches merge into the spectrum of both.
 *
 * @param logs all logs posted to the part, in any order
 * @param model the detail
 * @throws MeanAboveUltimateError when a counted mean reaches the ultimate of the detail's mean rule
 */
export function accountOf(logs: readonly LogOfAccount[], model: DetailModel): DetailAccount {
  const recorded = new Map<string, number>();
  for (const log of logs) recorded.set(log.loadLogId, recordedDamage(log, model).damage);
  const betweenLogs = logs.length === 0 ? 0 : betweenLogsDamage(logs, model).damage;
  return { recorded, betweenLogs, total: totalDamage([...recorded.values(), betweenLogs]) };
}

/** What the cycles closed within one log do to a detail. */
export function recordedDamage(log: LogOfAccount, model: DetailModel): SpectrumDamage {
  return damageOfSpectrum(closedCycles(log.spectrum), model);
}

/**
 * What the cycles do to a detail that close between logs, or stay open at the end.
 *
 * @throws RangeError without a log
 */
export function betweenLogsDamage(logs: readonly LogOfAccount[], model: DetailModel): SpectrumDamage {
  return damageOfSpectrum(cyclesBetweenLogs(logs), model);
}

/**
 * Sum of amounts that does not depend on their order: sorted, then added with compensation.
 *
 * @param amounts damages
 */
export function totalDamage(amounts: readonly number[]): number {
  const sum = new CompensatedSum();
  for (const amount of Float64Array.from(amounts).sort()) sum.add(amount);
  return sum.value;
}

import type { LedgerCheckDto, LedgerDifferenceDto } from '@stayledger/shared/contracts/ledger';

/** A checked ledger as lines of text: one for the vessel, one below it for each thing that differs. */
export function ledgerReport(check: LedgerCheckDto): string {
  const { vesselName, entries, chains, recomputed, reversals, differences, notRecomputed } = check;
  const verdict = differences.length === 0 ? 'holds' : `${differences.length} differ`;
  return [
    `${vesselName}: ${verdict} (${entries} entries in ${chains} chains, ${recomputed} amounts recomputed, ${reversals} reversals compared)`,
    ...differences.map((one) => `  differs: ${line(one)}`),
    ...notRecomputed.map((one) => `  not recomputed: ${line(one)}`),
  ].join('\n');
}

/** The last line: what was checked and what came of it. */
export function summaryOf(checks: readonly LedgerCheckDto[]): string {
  const sum = (pick: (check: LedgerCheckDto) => number) =>
    checks.reduce((total, check) => total + pick(check), 0);
  const differences = sum((check) => check.differences.length);
  return [
    `${checks.length} vessels`,
    `${sum((check) => check.entries)} entries`,
    `${sum((check) => check.recomputed)} amounts recomputed`,
    `${sum((check) => check.notRecomputed.length)} not recomputed`,
    `${differences} ${differences === 1 ? 'difference' : 'differences'}`,
  ].join(', ');
}

function line(one: LedgerDifferenceDto): string {
  const where = [
    one.positionLabel,
    one.detailName,
    one.kind,
    one.sequence === null ? null : `entry ${one.sequence}`,
  ]
    .filter((word) => word !== null)
    .join(', ');
  const amounts =
    one.written === null || one.recomputed === null
      ? ''
      : ` Written ${one.written}, recomputed ${one.recomputed}.`;
  return `${where}: ${one.what}${amounts}${one.entryId === null ? '' : ` [${one.entryId}]`}`;
}

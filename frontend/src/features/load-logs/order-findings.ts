import type { LogFindingDto } from '@stayledger/shared/contracts/load-logs';

const WEIGHT: Record<LogFindingDto['severity'], number> = { serious: 0, warning: 1, info: 2 };

function spanMs(finding: LogFindingDto): number {
  if (finding.fromAt === null || finding.toAt === null) return 0;
  return Date.parse(finding.toAt) - Date.parse(finding.fromAt);
}

/**
 * Findings in the order a reviewer should meet them: what may change the result most comes first. Severity says so
 * before anything else; within one severity the longer stretch, then the larger number of places.
 */
export function orderFindings(findings: readonly LogFindingDto[]): LogFindingDto[] {
  return [...findings].sort(
    (a, b) => WEIGHT[a.severity] - WEIGHT[b.severity] || spanMs(b) - spanMs(a) || b.count - a.count,
  );
}

import type { LogFindingDto } from '@stayledger/shared/contracts/load-logs';
import { useFormat } from '../../lib/formatting/use-format';
import styles from './finding-list.module.css';
import { orderFindings } from './order-findings';

const SEVERITY_WORDS: Record<LogFindingDto['severity'], string> = {
  serious: 'Serious',
  warning: 'Look at this',
  info: 'Note',
};

/** What the count came across, the weightiest first: what, where, what was done about it. */
export function FindingList({ findings, zone }: { findings: readonly LogFindingDto[]; zone: string }) {
  const format = useFormat();
  if (findings.length === 0) return <p>Nothing out of the ordinary was found in this log.</p>;
  return (
    <ol className={styles.list}>
      {orderFindings(findings).map((finding, index) => (
        <li
          key={`${finding.code}-${index}`}
          className={`${styles.item} ${finding.severity === 'info' ? styles.info : ''}`}
        >
          <p className={styles.message}>
            <span className={styles.mark} aria-hidden="true" />
            <span className={styles.severity}>{SEVERITY_WORDS[finding.severity]}: </span>
            {finding.message}
          </p>
          <p className={styles.where}>{whereOf(finding, zone, format)}</p>
          <p className={styles.action}>{finding.action}</p>
        </li>
      ))}
    </ol>
  );
}

function whereOf(finding: LogFindingDto, zone: string, format: ReturnType<typeof useFormat>): string {
  const places = [
    finding.column === null ? null : `column ${finding.column}`,
    finding.line === null ? null : `line ${format.number(finding.line)}`,
    finding.fromAt === null
      ? null
      : finding.toAt === null || finding.toAt === finding.fromAt
        ? format.instant(finding.fromAt, zone)
        : `${format.instant(finding.fromAt, zone)} to ${format.instant(finding.toAt, zone)}`,
    finding.count > 1 ? `${format.number(finding.count)} places` : null,
  ].filter((place) => place !== null);
  return places.length === 0 ? 'Concerns the whole log.' : `${places.join(', ')}.`;
}

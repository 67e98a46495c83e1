import type { LoadLogDto } from '@stayledger/shared/contracts/load-logs';
import { useFormat } from '../../lib/formatting/use-format';
import styles from './load-log-facts.module.css';

/** What the file holds, in figures. */
export function LoadLogFacts({ log, zone }: { log: LoadLogDto; zone: string }) {
  const format = useFormat();
  const facts: [string, string][] = [
    ['From', log.fromAt === null ? 'no time in the file' : format.instant(log.fromAt, zone)],
    ['To', log.toAt === null ? '–' : format.instant(log.toAt, zone)],
    ['Logged', format.hours(log.loggedHours)],
    ['Rows', format.number(log.rows)],
    ['Rate', log.sampleRateHz === null ? '–' : `${format.significant(log.sampleRateHz, 3)}\u00a0Hz`],
    ['File', format.bytes(log.sizeBytes)],
    ['Uploaded by', log.uploadedByName],
  ];
  return (
    <dl className={styles.facts}>
      {facts.map(([term, value]) => (
        <div key={term}>
          <dt>{term}</dt>
          <dd>{value}</dd>
        </div>
      ))}
    </dl>
  );
}

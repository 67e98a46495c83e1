import type { FleetRowDto } from '@stayledger/shared/contracts/vessels';
import { useQueries } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { ErrorState } from '../../components/feedback/error-state';
import { LoadingState } from '../../components/feedback/loading-state';
import { useRetryFailed } from '../../components/feedback/use-retry-failed';
import { DueWord } from '../../components/part-mark/due-word';
import { PartMark } from '../../components/part-mark/part-mark';
import { clock } from '../../lib/clock';
import type { Formatter } from '../../lib/formatting/format';
import { vesselQueries } from './vessels.queries';
import { dueWords, RULE_WORDS } from './vessel-words';
import styles from './fleet.module.css';

const SHOWN = 5;

/** What the day asks for: parts over or near their date, and logs that wait for a person. */
export function WorkDue({ format }: { format: Formatter }) {
  const [overdue, due, waiting] = useQueries({
    queries: [vesselQueries.work('overdue'), vesselQueries.work('due'), vesselQueries.work('waiting')],
  });
  const retryFailed = useRetryFailed();
  const failed = [overdue, due, waiting].find((query) => query.isError);
  if (failed) return <ErrorState error={failed.error} onRetry={retryFailed} />;
  if (!overdue.data || !due.data || !waiting.data) return <LoadingState label="Looking for work due" />;

  // A vessel whose first part is overdue may have another one due: it is named once, by the part that governs.
  const governed = new Map<string, FleetRowDto>();
  for (const row of [...overdue.data.items, ...due.data.items]) {
    if (row.governing && row.governing.due !== 'in-date') governed.set(row.id, row);
  }
  const dates = [...governed.values()];
  const more = dates.length > SHOWN || overdue.data.nextCursor !== null || due.data.nextCursor !== null;
  const logs = waiting.data.items;

  return (
    <section aria-labelledby="work-due" className={styles.work}>
      <h2 id="work-due">Work due</h2>
      {dates.length === 0 && logs.length === 0 ? (
        <p className="soft">Nothing is due within twelve months, and no log waits for review.</p>
      ) : null}
      <ul>
        {dates.slice(0, SHOWN).map((row) =>
          row.governing ? (
            <li key={row.id}>
              <span className={styles.governing}>
                <PartMark standing={row.governing} kindOfWire={row.governing.kindOfWire} size={24} />
                <Link to={paths.part.to(row.governing.partId)}>
                  {row.name}: {row.governing.positionLabel}
                </Link>
              </span>
              <span>
                <DueWord due={row.governing.due}>
                  {dueWords(row.governing, format, clock.todayOn(row.zone))}
                </DueWord>
                <span className="soft">, {RULE_WORDS[row.governing.rule]}</span>
              </span>
            </li>
          ) : null,
        )}
        {more ? (
          <li>
            <Link to="?filter=overdue">All vessels with parts overdue</Link>
          </li>
        ) : null}
        {logs.slice(0, SHOWN).map((row) => (
          <li key={`log${row.id}`}>
            <Link to={paths.loadLogs.to(row.id)}>
              {row.name}:{' '}
              {row.counts.logsWaiting === 1 ? 'a load log' : `${row.counts.logsWaiting} load logs`}
            </Link>
            <span className={styles.waiting}>waiting for review</span>
          </li>
        ))}
        {logs.length > SHOWN || waiting.data.nextCursor ? (
          <li>
            <Link to="?filter=waiting">All vessels with logs waiting</Link>
          </li>
        ) : null}
      </ul>
    </section>
  );
}

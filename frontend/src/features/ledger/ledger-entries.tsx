import type { LedgerEntryDto } from '@stayledger/shared/contracts/ledger';
import { useInfiniteQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { ErrorState } from '../../components/feedback/error-state';
import { LoadingState } from '../../components/feedback/loading-state';
import { useRetryFailed } from '../../components/feedback/use-retry-failed';
import { PlainButton } from '../../components/plain-button/plain-button';
import { CsvDownload } from '../../components/tables/csv-download';
import { DataTable, type DataTableColumn } from '../../components/tables/data-table';
import type { Formatter } from '../../lib/formatting/format';
import { useFormat } from '../../lib/formatting/use-format';
import { ENTRY_KIND_WORDS } from './entry-kind-words';
import styles from './ledger-entries.module.css';
import { ledgerQueries } from './ledger.queries';

/** All entries of a part's account with the evidence of each. */
export function LedgerEntries({ partId, zone }: { partId: string; zone: string }) {
  const format = useFormat();
  const query = useInfiniteQuery(ledgerQueries.ofPart(partId));
  const retryFailed = useRetryFailed();
  if (query.data === undefined) {
    return query.isError ? (
      <ErrorState error={query.error} onRetry={retryFailed} />
    ) : (
      <LoadingState label="Loading the ledger" />
    );
  }
  const entries = query.data.pages.flatMap((page) => page.items);
  if (entries.length === 0) {
    return <p>No entries yet. The first stand here when a load log with this part’s position is posted.</p>;
  }
  const shown = columns(format, zone);
  return (
    <>
      <CsvDownload name="ledger" rows={entries} columns={shown} />
      <DataTable
        caption="Entries of this part’s account"
        rows={entries}
        columns={shown}
        rowKey={(entry) => entry.id}
      />
      {query.hasNextPage && (
        <p>
          <PlainButton onClick={() => void query.fetchNextPage()} disabled={query.isFetchingNextPage}>
            {query.isFetchingNextPage ? 'Loading…' : 'Show more entries'}
          </PlainButton>
        </p>
      )}
    </>
  );
}

function columns(format: Formatter, zone: string): DataTableColumn<LedgerEntryDto>[] {
  return [
    {
      key: 'at',
      title: 'Posted',
      render: (entry) => format.instant(entry.postedAt, zone),
      value: (entry) => entry.postedAt,
    },
    {
      key: 'kind',
      title: 'Entry',
      render: (entry) => (
        <>
          {ENTRY_KIND_WORDS[entry.kind]}
          {entry.reason !== null && <span className={styles.reason}>{entry.reason}</span>}
        </>
      ),
      value: (entry) => ENTRY_KIND_WORDS[entry.kind],
    },
    {
      key: 'detail',
      title: 'Detail',
      render: (entry) => entry.detailName,
      value: (entry) => entry.detailName,
    },
    {
      key: 'allowance',
      title: 'Allowance',
      numeric: true,
      render: (entry) =>
        entry.allowance < 0 ? `−${format.percent(-entry.allowance)}` : format.percent(entry.allowance),
      value: (entry) => entry.allowance,
    },
    {
      key: 'damage',
      title: 'Damage',
      numeric: true,
      render: (entry) => format.scientific(entry.damage, 3),
      value: (entry) => entry.damage,
    },
    {
      key: 'log',
      title: 'Evidence',
      render: (entry) =>
        entry.loadLogId === null ? (
          'all posted logs in time order'
        ) : (
          <Link to={paths.loadLog.to(entry.loadLogId)}>{entry.loadLogName ?? 'load log'}</Link>
        ),
      value: (entry) => entry.loadLogName,
    },
    {
      key: 'curve',
      title: 'Curve',
      render: (entry) => (
        <Link to={paths.curve.to(entry.curveId)}>
          {entry.curveId}, version {entry.curveVersion}
        </Link>
      ),
      value: (entry) => `${entry.curveId} version ${entry.curveVersion}`,
    },
    {
      key: 'engine',
      title: 'Engine',
      render: (entry) => entry.engineVersion,
      value: (entry) => entry.engineVersion,
    },
    {
      key: 'by',
      title: 'Posted by',
      render: (entry) => entry.postedByName ?? 'the service',
      value: (entry) => entry.postedByName,
    },
    {
      key: 'number',
      title: 'Number',
      numeric: true,
      render: (entry) => entry.sequence,
      value: (entry) => entry.sequence,
    },
    {
      key: 'hash',
      title: 'Hash',
      render: (entry) => <span title={entry.hash}>{entry.hash.slice(0, 8)}</span>,
      value: (entry) => entry.hash,
    },
  ];
}

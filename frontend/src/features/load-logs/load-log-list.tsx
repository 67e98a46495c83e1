import UploadOutlined from '@ant-design/icons/es/icons/UploadOutlined';
import type { LoadLogDto } from '@stayledger/shared/contracts/load-logs';
import { useInfiniteQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { EmptyState } from '../../components/feedback/empty-state';
import { ErrorState } from '../../components/feedback/error-state';
import { LoadingState } from '../../components/feedback/loading-state';
import { useRetryFailed } from '../../components/feedback/use-retry-failed';
import { ButtonLink, PlainButton } from '../../components/plain-button/plain-button';
import { DataTable, type DataTableColumn } from '../../components/tables/data-table';
import type { Formatter } from '../../lib/formatting/format';
import { useFormat } from '../../lib/formatting/use-format';
import { loadLogWords } from './load-log-states';
import { loadLogQueries } from './load-logs.queries';

interface LoadLogListProps {
  vesselId: string;
  zone: string;
  mayUpload: boolean;
}

/** The Loads tab of a vessel: its logs, newest first, each with what it waits for. */
export function LoadLogList({ vesselId, zone, mayUpload }: LoadLogListProps) {
  const format = useFormat();
  const query = useInfiniteQuery(loadLogQueries.ofVessel(vesselId));
  const retryFailed = useRetryFailed();
  const add = mayUpload ? (
    <ButtonLink weight="primary" to={paths.addLoadLog.to(vesselId)}>
      <UploadOutlined aria-hidden />
      Add load log
    </ButtonLink>
  ) : null;
  if (query.data === undefined) {
    return query.isError ? (
      <ErrorState error={query.error} onRetry={retryFailed} />
    ) : (
      <LoadingState label="Loading the load logs" />
    );
  }
  const logs = query.data.pages.flatMap((page) => page.items);
  if (logs.length === 0) {
    return (
      <EmptyState title="No load logs yet" actions={add}>
        <p>
          Recorded rig loads will stand here: one row for each file, with its hours, what was found in it, and
          whether it was posted to the ledger. A .csv or .csv.gz file with one column for each sensor is
          enough to begin.
        </p>
      </EmptyState>
    );
  }
  return (
    <>
      {add !== null && <p>{add}</p>}
      <DataTable
        caption="Load logs, newest first"
        rows={logs}
        columns={columns(format, zone)}
        rowKey={(log) => log.id}
      />
      {query.hasNextPage && (
        <p>
          <PlainButton onClick={() => void query.fetchNextPage()} disabled={query.isFetchingNextPage}>
            {query.isFetchingNextPage ? 'Loading…' : 'Show older logs'}
          </PlainButton>
        </p>
      )}
    </>
  );
}

function columns(format: Formatter, zone: string): DataTableColumn<LoadLogDto>[] {
  return [
    {
      key: 'file',
      title: 'File',
      render: (log) => <Link to={paths.loadLog.to(log.id)}>{log.fileName}</Link>,
      value: (log) => log.fileName,
    },
    {
      key: 'state',
      title: 'State',
      render: (log) => `${loadLogWords(log).word}${progressOf(log, format)}`,
      value: (log) => loadLogWords(log).word,
    },
    {
      key: 'from',
      title: 'From',
      render: (log) => format.instant(log.fromAt, zone),
      value: (log) => log.fromAt,
    },
    { key: 'to', title: 'To', render: (log) => format.instant(log.toAt, zone), value: (log) => log.toAt },
    {
      key: 'hours',
      title: 'Logged, h',
      numeric: true,
      render: (log) => (log.loggedHours === null ? '–' : format.number(log.loggedHours, 1)),
      value: (log) => log.loggedHours,
    },
    {
      key: 'findings',
      title: 'Findings',
      numeric: true,
      render: (log) => findingsOf(log, format),
      value: (log) => log.findings.length,
    },
    {
      key: 'by',
      title: 'Uploaded by',
      render: (log) => log.uploadedByName,
      value: (log) => log.uploadedByName,
    },
  ];
}

function progressOf(log: LoadLogDto, format: Formatter): string {
  if (log.state === 'counting' && log.job !== null) return `, ${format.percent(log.job.progress, 0)}`;
  if (log.state === 'receiving') return `, ${format.percent(log.receivedBytes / log.sizeBytes, 0)}`;
  return '';
}

function findingsOf(log: LoadLogDto, format: Formatter): string {
  if (!['counted', 'posted', 'set-aside'].includes(log.state)) return '–';
  const serious = log.findings.filter((finding) => finding.severity === 'serious').length;
  return `${format.number(log.findings.length)}${serious > 0 ? ` (${format.number(serious)} serious)` : ''}`;
}

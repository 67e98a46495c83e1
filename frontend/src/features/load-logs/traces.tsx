import type { LogFindingDto } from '@stayledger/shared/contracts/load-logs';
import { useMemo, useState } from 'react';
import { CsvDownload } from '../../components/tables/csv-download';
import { DataTable, type DataTableColumn } from '../../components/tables/data-table';
import { useFormat } from '../../lib/formatting/use-format';
import { recordedStretches } from './broken-time-scale';
import { TraceChart, type Trace } from './trace-chart';
import styles from './traces.module.css';

interface TracesProps {
  traces: readonly Trace[];
  findings: readonly LogFindingDto[];
  zone: string;
  /** Where the pointer stands at first, such as on a day that another page pointed at. */
  initialMs: number | null;
}

interface TraceRow {
  key: string;
  label: string;
  atMs: number;
  lowKn: number;
  highKn: number;
}

/** All channels of a log over one common time, with one pointer through all of them. */
export function Traces({ traces, findings, zone, initialMs }: TracesProps) {
  const format = useFormat();
  const [cursorMs, setCursorMs] = useState<number | null>(initialMs);
  // Thousands of rows: they are made when somebody opens the table, not before.
  const [isTableOpen, setIsTableOpen] = useState(false);
  const drawn = traces.filter((trace) => trace.atMs.length > 0);
  const stretches = useMemo(() => recordedStretches(traces), [traces]);
  const rows = useMemo(
    () =>
      traces.flatMap((trace) =>
        trace.atMs.map((atMs, index): TraceRow => ({
          key: `${trace.column}-${index}`,
          label: trace.positionLabel,
          atMs,
          lowKn: trace.lowKn[index],
          highKn: trace.highKn[index],
        })),
      ),
    [traces],
  );
  if (drawn.length === 0) return <p>No load could be read in this log, so there is nothing to draw.</p>;
  const summary: DataTableColumn<Trace>[] = [
    { key: 'position', title: 'Position', render: (trace) => trace.positionLabel },
    {
      key: 'low',
      title: `Lowest, ${format.forceUnit}`,
      numeric: true,
      render: (trace) => format.forceFigure(trace.minKn),
    },
    {
      key: 'high',
      title: `Highest, ${format.forceUnit}`,
      numeric: true,
      render: (trace) => format.forceFigure(trace.maxKn),
    },
    {
      key: 'cycles',
      title: 'Closed cycles',
      numeric: true,
      render: (trace) => format.number(trace.closedCycles),
    },
    {
      key: 'missing',
      title: 'Missing samples',
      numeric: true,
      render: (trace) => format.number(trace.missing),
    },
  ];
  const columns: DataTableColumn<TraceRow>[] = [
    {
      key: 'at',
      title: `Time (${zone})`,
      render: (row) => format.instant(row.atMs, zone),
      value: (row) => new Date(row.atMs).toISOString(),
    },
    { key: 'position', title: 'Position', render: (row) => row.label, value: (row) => row.label },
    {
      key: 'low',
      title: `Lowest, ${format.forceUnit}`,
      numeric: true,
      render: (row) => format.forceFigure(row.lowKn),
      value: (row) => format.forceFromKn(row.lowKn),
    },
    {
      key: 'high',
      title: `Highest, ${format.forceUnit}`,
      numeric: true,
      render: (row) => format.forceFigure(row.highKn),
      value: (row) => format.forceFromKn(row.highKn),
    },
  ];
  return (
    <>
      {stretches.length > 1 && (
        <p className="soft">Long pauses are cut out of the time axis where it shows two strokes.</p>
      )}
      {drawn.map((trace) => (
        <TraceChart
          key={trace.column}
          trace={trace}
          findings={findings}
          zone={zone}
          stretches={stretches}
          cursorMs={cursorMs}
          onCursor={setCursorMs}
        />
      ))}
      <DataTable
        caption="Channels of this log"
        rows={traces}
        columns={summary}
        rowKey={(trace) => trace.column}
      />
      <details className={styles.behind} onToggle={(event) => setIsTableOpen(event.currentTarget.open)}>
        <summary>Table behind these traces</summary>
        {isTableOpen && (
          <>
            <CsvDownload name="load-traces" rows={rows} columns={columns} />
            <DataTable
              caption="Highest and lowest load per stretch of time"
              rows={rows}
              columns={columns}
              rowKey={(row) => row.key}
            />
          </>
        )}
      </details>
    </>
  );
}

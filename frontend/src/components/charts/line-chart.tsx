import { lazy, Suspense, useId, type ReactNode } from 'react';
import { DataTable, type DataTableColumn } from '../tables/data-table';
import { CsvDownload } from '../tables/csv-download';
import { EmptyState } from '../feedback/empty-state';
import { LoadingState } from '../feedback/loading-state';
import styles from './charts.module.css';
import type { LineChartCanvasProps } from './line-chart-drawing';

// nivo comes in a chunk of its own, after the words and the table of the page.
const LineChartDrawing = lazy(async () => ({
  default: (await import('./line-chart-drawing')).LineChartDrawing,
}));

export interface LineChartProps<Row> extends LineChartCanvasProps {
  title: string;
  /** What the drawing shows, in one sentence; read out in place of it and shown below the title. */
  description: string;
  /** Level of the title in the page: 2 right below the page's heading. */
  headingLevel?: 2 | 3;
  height?: number;
  /** Twin of the drawing: the same figures as rows. */
  rows: readonly Row[];
  columns: readonly DataTableColumn<Row>[];
  rowKey: (row: Row) => string;
  /** Name of the downloaded file, without its ending. */
  csvName: string;
  /** Said where there is nothing to draw yet. */
  emptyText: string;
  footnote?: ReactNode;
}

/** The one chart grammar: title, drawing with units on its axes, and the table behind it, also as CSV. */
export function LineChart<Row>({
  title,
  description,
  headingLevel = 3,
  height = 320,
  rows,
  columns,
  rowKey,
  csvName,
  emptyText,
  footnote,
  ...drawing
}: LineChartProps<Row>) {
  const id = useId();
  const Heading = headingLevel === 2 ? 'h2' : 'h3';
  const empty = drawing.series.every((series) => series.points.length === 0);
  return (
    <figure className={styles.figure} aria-labelledby={`${id}title`}>
      <figcaption>
        <Heading id={`${id}title`}>{title}</Heading>
        <p className={styles.description}>{description}</p>
      </figcaption>
      {empty ? (
        <EmptyState title="Nothing to draw yet">
          <p>{emptyText}</p>
        </EmptyState>
      ) : (
        <>
          <div
            role="img"
            aria-label={`${title}. ${description}`}
            style={{ height }}
            className={styles.drawing}
          >
            <Suspense fallback={<LoadingState label="Drawing" />}>
              <LineChartDrawing {...drawing} />
            </Suspense>
          </div>
          {footnote}
          <details className={styles.behind}>
            <summary>Table behind this chart</summary>
            <CsvDownload name={csvName} rows={rows} columns={columns} />
            <DataTable caption={title} rows={rows} columns={columns} rowKey={rowKey} />
          </details>
        </>
      )}
    </figure>
  );
}

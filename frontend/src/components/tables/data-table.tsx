import type { ReactNode } from 'react';
import styles from './tables.module.css';

export interface DataTableColumn<Row> {
  key: string;
  /** Header with the unit: "Range, MPa". */
  title: string;
  /** Cell as shown. */
  render: (row: Row) => ReactNode;
  /** The bare value, for the CSV file; left out, the column stays out of the file. */
  value?: (row: Row) => string | number | null;
  numeric?: boolean;
}

interface DataTableProps<Row> {
  /** Read out as the table's name; shown only with `showCaption`. */
  caption: string;
  showCaption?: boolean;
  rows: readonly Row[];
  columns: readonly DataTableColumn<Row>[];
  rowKey: (row: Row) => string;
}

/** A plain ruled table that scrolls sideways on its own, reachable by keyboard. The first column names the row. */
export function DataTable<Row>({ caption, showCaption = false, rows, columns, rowKey }: DataTableProps<Row>) {
  return (
    <div className={styles.scroll} tabIndex={0} role="region" aria-label={caption}>
      <table className={styles.table}>
        <caption className={showCaption ? styles.caption : 'visually-hidden'}>{caption}</caption>
        <thead>
          <tr>
            {columns.map((column) => (
              <th key={column.key} scope="col" className={column.numeric ? styles.numeric : undefined}>
                {column.title}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={rowKey(row)}>
              {columns.map((column, index) =>
                index === 0 ? (
                  <th key={column.key} scope="row" className={column.numeric ? styles.numeric : undefined}>
                    {column.render(row)}
                  </th>
                ) : (
                  <td key={column.key} className={column.numeric ? styles.numeric : undefined}>
                    {column.render(row)}
                  </td>
                ),
              )}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

import type { ReactNode } from 'react';
import type { GlossaryWord } from '../glossary/glossary';
import { Term } from '../glossary/term';
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
  /** Word of the glossary that explains the header. */
  help?: GlossaryWord;
}

interface DataTableProps<Row> {
  /** Read out as the table's name; shown only with `showCaption`. */
  caption: string;
  showCaption?: boolean;
  /** On a phone each row becomes a block of named lines: for rows that are read one by one. */
  stackOnPhone?: boolean;
  rows: readonly Row[];
  columns: readonly DataTableColumn<Row>[];
  rowKey: (row: Row) => string;
}

/**
 * A plain ruled table that scrolls sideways on its own, reachable by keyboard. The first column names the row. Stacked on
 * a phone, the roles are written out, since a table laid out as blocks loses them in some browsers; the header goes, and
 * each line carries its name.
 */
export function DataTable<Row>({
  caption,
  showCaption = false,
  stackOnPhone = false,
  rows,
  columns,
  rowKey,
}: DataTableProps<Row>) {
  return (
    <div className={styles.scroll} tabIndex={0} role="group" aria-label={caption}>
      <table role="table" className={stackOnPhone ? `${styles.table} ${styles.stack}` : styles.table}>
        <caption className={showCaption ? styles.caption : 'visually-hidden'}>{caption}</caption>
        <thead role="rowgroup">
          <tr role="row">
            {columns.map((column) => (
              <th
                key={column.key}
                role="columnheader"
                scope="col"
                className={column.numeric ? styles.numeric : undefined}
              >
                {column.help ? <Term word={column.help}>{column.title}</Term> : column.title}
              </th>
            ))}
          </tr>
        </thead>
        <tbody role="rowgroup">
          {rows.map((row) => (
            <tr key={rowKey(row)} role="row">
              {columns.map((column, index) => {
                const className = column.numeric ? styles.numeric : undefined;
                return index === 0 ? (
                  <th key={column.key} role="rowheader" scope="row" className={className}>
                    {column.render(row)}
                  </th>
                ) : (
                  <td key={column.key} role="cell" className={className} data-title={column.title}>
                    {column.render(row)}
                  </td>
                );
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

import DownloadOutlined from '@ant-design/icons/es/icons/DownloadOutlined';
import { PlainButton } from '../plain-button/plain-button';
import type { DataTableColumn } from './data-table';
import { toCsv } from './to-csv';

/** Saves the table as a CSV file: points as decimal marks, whatever the person reads, so that programs read it alike. */
export function CsvDownload<Row>({
  name,
  rows,
  columns,
}: {
  name: string;
  rows: readonly Row[];
  columns: readonly DataTableColumn<Row>[];
}) {
  const save = () => {
    const address = URL.createObjectURL(new Blob([toCsv(rows, columns)], { type: 'text/csv;charset=utf-8' }));
    const link = document.createElement('a');
    link.href = address;
    link.download = `${name}.csv`;
    link.click();
    // Revoked on the next turn: the browser has taken the file by then.
    window.setTimeout(() => URL.revokeObjectURL(address), 0);
  };
  return (
    <PlainButton onClick={save}>
      <DownloadOutlined aria-hidden />
      Download as CSV
    </PlainButton>
  );
}

import type { ImportedRigDto } from '@stayledger/shared/contracts/rig';
import { writeRigCsv } from '@stayledger/shared/rig/csv/rig-csv';
import { useMutation } from '@tanstack/react-query';
import { useId, useState } from 'react';
import { Attention } from '../../components/feedback/attention';
import { PlainButton } from '../../components/plain-button/plain-button';
import { DataTable, type DataTableColumn } from '../../components/tables/data-table';
import { isApiError } from '../../lib/api-error';
import { importRig, rigCsv } from './rig-start.mutations';
import styles from './rig-start.module.css';
import { saveText } from './save-text';

type Line = ImportedRigDto['lines'][number];

const OUTCOME_WORDS: Record<Line['outcome'], string> = {
  'adds-position-and-part': 'Adds the place and its part',
  'adds-position': 'Adds the place',
  'fits-part': 'Fits the part',
  'left-alone': 'There already, left alone',
  wrong: 'Wrong',
};
const COLUMNS: DataTableColumn<Line>[] = [
  { key: 'label', title: 'Place', render: ({ label }) => label },
  { key: 'line', title: 'Line', numeric: true, render: ({ line }) => line },
  {
    key: 'outcome',
    title: 'What happens',
    render: ({ outcome, errors }) => (errors.length > 0 ? errors.join(' ') : OUTCOME_WORDS[outcome]),
  },
];

interface FileStartProps {
  vesselId: string;
  onDone: () => void | Promise<void>;
}

/** A rig from a file: tried first, line by line; taken only when no line is wrong. */
export function FileStart({ vesselId, onDone }: FileStartProps) {
  const id = useId();
  const [csv, setCsv] = useState('');
  const trying = useMutation({
    mutationFn: (text: string) => importRig(vesselId, { csv: text, apply: false }),
  });
  const applying = useMutation({
    mutationFn: () => importRig(vesselId, { csv, apply: true }),
    onSuccess: (result) => (result.applied ? onDone() : undefined),
  });
  const exporting = useMutation({
    mutationFn: () => rigCsv(vesselId),
    onSuccess: ({ fileName, csv: text }) => saveText(fileName, text),
  });
  const result = applying.data ?? trying.data;
  const wrong = result?.lines.filter(({ errors }) => errors.length > 0).length ?? 0;
  const problem = applying.error ?? trying.error ?? exporting.error;
  return (
    <section aria-labelledby="from-file" className={styles.start}>
      <h2 id="from-file">From a file</h2>
      <p>
        A CSV file with one line for each place. Numbers may have a decimal point or comma; a cell left empty
        means not known.
      </p>
      <div className={styles.actions}>
        <PlainButton onClick={() => saveText('rig template.csv', writeRigCsv([]))}>
          Download an empty template
        </PlainButton>
        <PlainButton disabled={exporting.isPending} onClick={() => exporting.mutate()}>
          Download this rig
        </PlainButton>
      </div>
      <label className={styles.label} htmlFor={id}>
        File to read
      </label>
      <input
        id={id}
        type="file"
        accept=".csv,text/csv"
        className={styles.file}
        onChange={async (event) => {
          const [file] = event.target.files ?? [];
          applying.reset();
          trying.reset();
          const text = file ? await file.text() : '';
          setCsv(text);
          if (text !== '') trying.mutate(text);
        }}
      />
      {trying.isPending ? <p role="status">Trying every line…</p> : null}
      {problem ? <Attention role="alert">{problemWords(problem)}</Attention> : null}
      {result ? (
        <>
          <p role="status">
            {wrong === 0
              ? `${result.lines.length} ${result.lines.length === 1 ? 'line' : 'lines'} read, none wrong. Nothing has been changed yet.`
              : `${wrong} of ${result.lines.length} lines ${wrong === 1 ? 'is' : 'are'} wrong. Mend the file and choose it again; nothing has been changed.`}
          </p>
          <DataTable
            caption="What each line would do"
            stackOnPhone
            rows={result.lines}
            columns={COLUMNS}
            rowKey={({ line }) => String(line)}
          />
          <PlainButton
            weight="primary"
            disabled={wrong > 0 || result.lines.length === 0 || applying.isPending}
            onClick={() => applying.mutate()}
          >
            {applying.isPending ? 'Taking it over…' : 'Take these lines over'}
          </PlainButton>
        </>
      ) : null}
    </section>
  );
}

/** A file that is no CSV is refused as a whole, with the line where it goes wrong. */
function problemWords(problem: Error): string {
  const [words] = isApiError(problem) ? (problem.fieldErrors.csv ?? []) : [];
  return words ?? problem.message;
}

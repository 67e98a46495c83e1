import { LOG_COLUMNS_MAX } from '@stayledger/shared/contracts/load-logs';
import { recogniseLog, type LogProblem } from '@stayledger/shared/fatigue/load-history/recognise-log';
import type { RecognisedLog } from './mapping-draft';
import { FileHeadError, readHead } from './read-head';

/** What the first bytes of a file show, arranged for the page. */
export interface RecognisedFile {
  log: RecognisedLog;
  compressed: boolean;
  headers: string[];
  rows: string[][];
  firstValues: Map<string, string[]>;
  /** Doubts about single columns, said beside them. */
  columnDoubts: Map<string, string>;
  /** Everything else a person should know, said above. */
  notes: string[];
  /** First cell of the time column. */
  firstTime: string | null;
}

/** Without these nothing can be counted, whatever a person chooses. */
const HOPELESS: readonly LogProblem['code'][] = ['empty', 'not-text', 'encoding', 'no-rows'];
/** The form itself asks for these, in its own words. */
const ASKED_ELSEWHERE: readonly LogProblem['code'][] = ['no-time', 'time-zone-unknown', 'unit-unknown'];

const MENDS: Partial<Record<LogProblem['code'], string>> = {
  'not-text': 'Export the recording as CSV text, or as .csv.gz, and choose that file.',
  'no-rows': 'Choose the file that holds the recording: a header line, then one line for each sample.',
};

/** Looks at the beginning of a file in the browser. Throws `FileHeadError`, in words, when it cannot be a load log. */
export async function recogniseFile(file: Blob): Promise<RecognisedFile> {
  const head = await readHead(file);
  const found = recogniseLog(head.bytes);
  const hopeless = found.problems.find((problem) => HOPELESS.includes(problem.code));
  if (hopeless) {
    throw new FileHeadError([hopeless.message, MENDS[hopeless.code]].filter(Boolean).join(' '));
  }
  if (found.columns.length > LOG_COLUMNS_MAX) {
    throw new FileHeadError(
      `Line ${Math.max(1, found.headerLine)} has ${found.columns.length} columns, and at most ${LOG_COLUMNS_MAX} can be matched. Export the time and the load columns only, and choose that file.`,
    );
  }
  const time = found.time;
  const timeColumn = time === null ? null : found.columns[time.index];
  const columnDoubts = new Map<string, string>();
  const notes: string[] = [];
  for (const problem of found.problems) {
    if (ASKED_ELSEWHERE.includes(problem.code)) continue;
    if (problem.column === undefined) notes.push(problem.message);
    else columnDoubts.set(problem.column, problem.message);
  }
  return {
    log: {
      delimiter: found.delimiter,
      decimalComma: found.decimalComma,
      columns: found.columns
        .filter((column, index, all) => all.findIndex((other) => other.header === column.header) === index)
        .map(({ header, unit, kind }) => ({ name: header, unit, kind })),
      time:
        time === null || timeColumn === null
          ? null
          : { column: timeColumn.header, format: time.format, hasOffset: time.hasOffset },
      sampleRateHz: found.sampleRateHz,
    },
    compressed: head.compressed,
    headers: found.columns.map((column) => column.header),
    rows: found.rows,
    firstValues: new Map(found.columns.map((column) => [column.header, column.firstValues])),
    columnDoubts,
    notes,
    firstTime: timeColumn?.firstValues.find((value) => value !== '') ?? null,
  };
}

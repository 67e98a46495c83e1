import type { LedgerCheckDto, LedgerDifferenceDto } from '@stayledger/shared/contracts/ledger';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Attention } from '../../components/feedback/attention';
import { CsvDownload } from '../../components/tables/csv-download';
import { DataTable, type DataTableColumn } from '../../components/tables/data-table';
import type { Formatter } from '../../lib/formatting/format';
import { useFormat } from '../../lib/formatting/use-format';
import { ENTRY_KIND_WORDS } from './entry-kind-words';
import styles from './ledger-check.module.css';

/** What a check of a vessel's ledger found, and what it cannot find. */
export function LedgerCheck({ check, zone }: { check: LedgerCheckDto; zone: string }) {
  const format = useFormat();
  const { differences, notRecomputed } = check;
  const columns = differenceColumns(format);
  return (
    <>
      {differences.length === 0 ? (
        <p role="status" className={styles.verdict}>
          {check.entries === 0
            ? 'There is nothing to check yet: no load log has been posted on this vessel.'
            : 'Nothing differs.'}
        </p>
      ) : (
        <Attention role="alert">
          {differences.length === 1
            ? 'One thing differs. Rely on no figure of that part until it is explained.'
            : `${format.number(differences.length)} things differ. Rely on no figure of these parts until they are explained.`}
        </Attention>
      )}
      <dl className={styles.counts}>
        <Count name="Checked" value={format.instant(check.checkedAt, zone)} />
        <Count name="Parts, also removed ones" value={format.number(check.parts)} />
        <Count name="Entries, each hash recomputed" value={format.number(check.entries)} />
        <Count name="Amounts recomputed from stored spectra" value={format.number(check.recomputed)} />
        <Count name="Reversals compared with what they take back" value={format.number(check.reversals)} />
        <Count name="Amounts that cannot be recomputed" value={format.number(notRecomputed.length)} />
      </dl>
      {differences.length > 0 && (
        <section aria-labelledby="differs">
          <h2 id="differs">What differs</h2>
          <Found caption="What differs" rows={differences} columns={columns} />
        </section>
      )}
      {notRecomputed.length > 0 && (
        <section aria-labelledby="not-recomputed">
          <h2 id="not-recomputed">Not recomputed</h2>
          <p>
            The hashes of these entries hold or are listed above. Their amounts stand as they were posted.
          </p>
          <Found caption="Not recomputed" rows={notRecomputed} columns={columns} />
        </section>
      )}
    </>
  );
}

function Found({
  caption,
  rows,
  columns,
}: {
  caption: string;
  rows: readonly LedgerDifferenceDto[];
  columns: DataTableColumn<LedgerDifferenceDto>[];
}) {
  return (
    <>
      <DataTable
        caption={caption}
        stackOnPhone
        rows={rows}
        columns={columns}
        rowKey={(row) => `${row.partId} ${row.entryId ?? row.detailName ?? ''} ${row.kind ?? ''} ${row.what}`}
      />
      <p>
        <CsvDownload name={caption.toLowerCase()} rows={rows} columns={columns} />
      </p>
    </>
  );
}

function Count({ name, value }: { name: string; value: string }) {
  return (
    <div>
      <dt>{name}</dt>
      <dd>{value}</dd>
    </div>
  );
}

function differenceColumns(format: Formatter): DataTableColumn<LedgerDifferenceDto>[] {
  return [
    {
      key: 'part',
      title: 'Part',
      render: (row) => <Link to={paths.part.to(row.partId)}>{row.positionLabel}</Link>,
      value: (row) => row.positionLabel,
    },
    {
      key: 'entry',
      title: 'Entry',
      render: entryWords,
      value: entryWords,
    },
    { key: 'what', title: 'Finding', render: (row) => row.what, value: (row) => row.what },
    {
      key: 'written',
      title: 'Damage as written',
      numeric: true,
      render: (row) => (row.written === null ? '–' : format.scientific(row.written, 6)),
      value: (row) => row.written,
    },
    {
      key: 'recomputed',
      title: 'Recomputed',
      numeric: true,
      render: (row) => (row.recomputed === null ? '–' : format.scientific(row.recomputed, 6)),
      value: (row) => row.recomputed,
    },
  ];
}

function entryWords({ detailName, kind, sequence }: LedgerDifferenceDto): string {
  const words = [
    detailName,
    kind === null ? null : ENTRY_KIND_WORDS[kind].toLowerCase(),
    sequence === null ? null : `number ${sequence}`,
  ].filter((word) => word !== null);
  return words.length === 0 ? 'the whole account' : words.join(', ');
}

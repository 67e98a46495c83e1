import type { CurveDto } from '@stayledger/shared/contracts/curves';
import { useMemo, useState } from 'react';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { EmptyState } from '../../components/feedback/empty-state';
import { PlainInput } from '../../components/forms/plain-fields';
import { PlainButton } from '../../components/plain-button/plain-button';
import { DataTable, type DataTableColumn } from '../../components/tables/data-table';
import { ENVIRONMENT_WORDS, MEASURE_WORDS, PROVENANCE_SHORT } from './reference-words';
import styles from './reference.module.css';

const SHOWN_AT_FIRST = 25;

const columns: DataTableColumn<CurveDto>[] = [
  {
    key: 'name',
    title: 'Curve',
    render: (curve) => <Link to={paths.curve.to(curve.id)}>{curve.name}</Link>,
  },
  { key: 'applies', title: 'For', render: ({ appliesTo }) => appliesTo },
  { key: 'measure', title: 'Measure', render: ({ measure }) => MEASURE_WORDS[measure] },
  { key: 'environment', title: 'Environment', render: ({ environment }) => ENVIRONMENT_WORDS[environment] },
  { key: 'provenance', title: 'Where from', render: ({ provenance }) => PROVENANCE_SHORT[provenance] },
];

/** Every curve, found by name, use or source. All of them travel in one reply, so it is searched in place. */
export function CurveTable({ curves }: { curves: CurveDto[] }) {
  const [words, setWords] = useState('');
  const [showAll, setShowAll] = useState(false);
  const found = useMemo(() => matching(curves, words), [curves, words]);
  const shown = showAll ? found : found.slice(0, SHOWN_AT_FIRST);
  return (
    <>
      <div className={styles.search}>
        <PlainInput
          label="Find a curve"
          type="search"
          placeholder="Standard, class, use"
          value={words}
          onChange={(event) => setWords(event.target.value)}
        />
        <span role="status" className="soft">
          {found.length === curves.length
            ? `${curves.length} curves`
            : `${found.length} of ${curves.length} curves`}
        </span>
      </div>
      {found.length === 0 ? (
        <EmptyState title="No curve matches">
          <p>Use fewer words.</p>
        </EmptyState>
      ) : (
        <DataTable caption="Curves" stackOnPhone rows={shown} columns={columns} rowKey={({ id }) => id} />
      )}
      {shown.length < found.length ? (
        <PlainButton className={styles.more} onClick={() => setShowAll(true)}>
          Show all {found.length}
        </PlainButton>
      ) : null}
    </>
  );
}

/** Curves that hold every word somewhere in their names, use or source. */
function matching(curves: CurveDto[], words: string): CurveDto[] {
  const wanted = words.toLowerCase().split(/\s+/).filter(Boolean);
  if (wanted.length === 0) return curves;
  return curves.filter((curve) => {
    const text = [
      curve.id,
      curve.name,
      curve.appliesTo,
      curve.source,
      MEASURE_WORDS[curve.measure],
      ENVIRONMENT_WORDS[curve.environment],
      curve.provenance,
    ]
      .join(' ')
      .toLowerCase();
    return wanted.every((word) => text.includes(word));
  });
}

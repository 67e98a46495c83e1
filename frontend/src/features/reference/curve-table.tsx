import type { CurveDto } from '@stayledger/shared/contracts/curves';
import Input from 'antd/es/input';
import Table from 'antd/es/table';
import { useMemo, useState } from 'react';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { EmptyState } from '../../components/feedback/empty-state';
import { ENVIRONMENT_WORDS, MEASURE_WORDS, PROVENANCE_SHORT } from './reference-words';
import styles from './reference.module.css';

const byText = (of: (curve: CurveDto) => string) => (a: CurveDto, b: CurveDto) =>
  of(a).localeCompare(of(b), 'en', { numeric: true });

const columns = [
  {
    title: 'Curve',
    key: 'name',
    sorter: byText(({ name }) => name),
    render: (_: unknown, curve: CurveDto) => <Link to={paths.curve.to(curve.id)}>{curve.name}</Link>,
  },
  { title: 'For', key: 'applies', render: (_: unknown, { appliesTo }: CurveDto) => appliesTo },
  {
    title: 'Measure',
    key: 'measure',
    sorter: byText(({ measure }) => measure),
    render: (_: unknown, { measure }: CurveDto) => MEASURE_WORDS[measure],
  },
  {
    title: 'Environment',
    key: 'environment',
    sorter: byText(({ environment }) => environment),
    render: (_: unknown, { environment }: CurveDto) => ENVIRONMENT_WORDS[environment],
  },
  {
    title: 'Where from',
    key: 'provenance',
    sorter: byText(({ provenance }) => provenance),
    render: (_: unknown, { provenance }: CurveDto) => PROVENANCE_SHORT[provenance],
  },
];

/** Every curve, found by name, use or source. All of them travel in one reply, so it is searched in place. */
export function CurveTable({ curves }: { curves: CurveDto[] }) {
  const [words, setWords] = useState('');
  const found = useMemo(() => matching(curves, words), [curves, words]);
  return (
    <>
      <div className={styles.search}>
        <Input
          type="search"
          aria-label="Find a curve"
          placeholder="Find a curve: standard, class, use"
          value={words}
          onChange={(event) => setWords(event.target.value)}
          allowClear
        />
        <span role="status" className="soft">
          {found.length === curves.length
            ? `${curves.length} curves`
            : `${found.length} of ${curves.length} curves`}
        </span>
      </div>
      {/* Scrolled by a box of ours: antd's own scrolling measures with a style element that the page's policy refuses. */}
      <div className={styles.scroll} tabIndex={0} role="group" aria-label="Curves">
        <Table<CurveDto>
          rowKey="id"
          size="small"
          columns={columns}
          dataSource={found}
          pagination={{ pageSize: 25, hideOnSinglePage: true, showSizeChanger: false }}
          locale={{
            emptyText: (
              <EmptyState title="No curve matches">
                <p>Use fewer words.</p>
              </EmptyState>
            ),
          }}
        />
      </div>
    </>
  );
}

/** Curves that hold every word somewhere in their names, use or source. */
export function matching(curves: CurveDto[], words: string): CurveDto[] {
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

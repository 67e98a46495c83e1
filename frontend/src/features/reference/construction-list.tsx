import type { ConstructionDto } from '@stayledger/shared/contracts/constructions';
import { DataTable } from '../../components/tables/data-table';
import { useFormat } from '../../lib/formatting/use-format';
import { PROVENANCE_WORDS } from './reference-words';
import styles from './reference.module.css';

/** Each construction with its sizes folded away, its source and what that is worth. */
export function ConstructionList({ constructions }: { constructions: ConstructionDto[] }) {
  return (
    <>
      {constructions.map((construction) => (
        <Construction key={construction.id} construction={construction} />
      ))}
    </>
  );
}

function Construction({ construction }: { construction: ConstructionDto }) {
  const format = useFormat();
  const rows = construction.sizes;
  return (
    <details className={styles.construction}>
      <summary>
        {construction.name} <span className="soft">{rows.length} sizes</span>
      </summary>
      <p>
        Source: {construction.source}.{' '}
        <span className="soft">{sentence(PROVENANCE_WORDS[construction.provenance])}</span>
      </p>
      <p className="soft">{construction.provenanceNote}</p>
      <p>
        Stiffness as built: {format.number(construction.youngGpa, 0)} GPa. Metal fills{' '}
        {format.percent(construction.fillFactor, 0)} of the circle round it.
      </p>
      <DataTable
        caption={`Sizes of ${construction.name}`}
        rows={rows}
        rowKey={(size) => size.designation}
        columns={[
          {
            key: 'size',
            title: 'Size',
            render: (size) => size.designation,
            value: (size) => size.designation,
          },
          {
            key: 'diameter',
            title: 'Diameter, mm',
            numeric: true,
            render: (size) => format.number(size.diameterMm, 2),
          },
          {
            key: 'area',
            title: 'Metallic area, mm²',
            numeric: true,
            render: (size) => format.significant(size.metallicAreaMm2, 3),
          },
          {
            key: 'load',
            title: `Breaking load, ${format.forceUnit}`,
            numeric: true,
            render: (size) =>
              size.breakingLoads
                .map(
                  ({ gradeMpa, breakingLoadKn }) =>
                    `${format.forceFigure(breakingLoadKn)}${gradeMpa ? ` (${gradeMpa} MPa)` : ''}`,
                )
                .join(', '),
          },
          {
            key: 'mass',
            title: 'Mass, kg/m',
            numeric: true,
            render: (size) => format.significant(size.massKgPerM, 3),
          },
        ]}
      />
    </details>
  );
}

function sentence(words: string): string {
  return `${words.charAt(0).toUpperCase()}${words.slice(1)}.`;
}

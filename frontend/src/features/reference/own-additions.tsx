import type { ListedConstructionDto } from '@stayledger/shared/contracts/constructions';
import type { ListedCurveDto } from '@stayledger/shared/contracts/curves';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { ButtonLink } from '../../components/plain-button/plain-button';
import { DataTable } from '../../components/tables/data-table';
import { MEASURE_WORDS, PROVENANCE_SHORT } from './reference-words';
import styles from './reference.module.css';

interface OwnAdditionsProps {
  curves: ListedCurveDto[];
  constructions: ListedConstructionDto[];
  mayAdd: boolean;
}

/** What firms of the person added, kept apart from what comes with the product: nobody else has looked at it. */
export function OwnAdditions({ curves, constructions, mayAdd }: OwnAdditionsProps) {
  if (!mayAdd && curves.length === 0 && constructions.length === 0) return null;
  return (
    <section aria-labelledby="own" className={styles.own}>
      <h2 id="own">Added by your firm</h2>
      <p>
        Your firm answers for these figures. They are shown to your firm, and to whoever reads a part they
        were used on.
      </p>
      {curves.length + constructions.length === 0 ? (
        <p className="soft">Nothing yet: tests of your own, or a maker’s table, will stand here.</p>
      ) : (
        <DataTable
          caption="Added by your firm"
          stackOnPhone
          rows={[
            ...curves.map((curve) => ({
              id: curve.id,
              name: <Link to={paths.curve.to(curve.id)}>{curve.name}</Link>,
              what: `curve, ${MEASURE_WORDS[curve.measure]}`,
              version: curve.version,
              provenance: PROVENANCE_SHORT[curve.provenance],
              source: curve.source,
            })),
            ...constructions.map((one) => ({
              id: one.id,
              name: mayAdd ? <Link to={paths.reviseConstruction.to(one.id)}>{one.name}</Link> : one.name,
              what: `construction, ${one.sizes.length} ${one.sizes.length === 1 ? 'size' : 'sizes'}`,
              version: one.version,
              provenance: PROVENANCE_SHORT[one.provenance],
              source: one.source,
            })),
          ]}
          rowKey={({ id }) => id}
          columns={[
            { key: 'name', title: 'Name', render: ({ name }) => name },
            { key: 'what', title: 'What', render: ({ what }) => what },
            { key: 'version', title: 'Version', render: ({ version }) => version },
            { key: 'provenance', title: 'Where from', render: ({ provenance }) => provenance },
            { key: 'source', title: 'Source', render: ({ source }) => <span>{source}</span> },
          ]}
        />
      )}
      {mayAdd ? (
        <div className={styles.actions}>
          <ButtonLink to={paths.addCurve.pattern}>Add a curve</ButtonLink>
          <ButtonLink to={paths.addConstruction.pattern}>Add a construction</ButtonLink>
        </div>
      ) : null}
    </section>
  );
}

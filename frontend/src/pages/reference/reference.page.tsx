import { useQuery } from '@tanstack/react-query';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { ConstructionList } from '../../features/reference/construction-list';
import { CurveTable } from '../../features/reference/curve-table';
import { OwnAdditions } from '../../features/reference/own-additions';
import { referenceQueries } from '../../features/reference/reference.queries';
import styles from '../../features/reference/reference.module.css';
import { useCan } from '../../lib/session';

export function ReferencePage() {
  const curves = useQuery(referenceQueries.curves());
  const constructions = useQuery(referenceQueries.constructions());
  const mayAdd = useCan('curves:add');
  const own = <Item extends { firm: unknown }>(items: Item[] | undefined) =>
    (items ?? []).filter(({ firm }) => firm !== null);
  const shipped = <Item extends { firm: unknown }>(items: Item[]) =>
    items.filter(({ firm }) => firm === null);
  return (
    <>
      <PageHeading
        title="Reference data"
        below="Every figure names its source and how it was read. A changed figure is a new version; accounts keep the version they were posted with."
      />
      {curves.data && constructions.data ? (
        <OwnAdditions
          curves={own(curves.data.items)}
          constructions={own(constructions.data.items)}
          mayAdd={mayAdd}
        />
      ) : null}
      <section aria-labelledby="curves">
        <h2 id="curves">Curves</h2>
        <QueryView query={curves} loadingLabel="Opening the curves">
          {({ items }) => <CurveTable curves={shipped(items)} />}
        </QueryView>
      </section>
      <section aria-labelledby="constructions" className={styles.section}>
        <h2 id="constructions">Constructions</h2>
        <QueryView query={constructions} loadingLabel="Opening the constructions">
          {({ items }) => <ConstructionList constructions={shipped(items)} />}
        </QueryView>
      </section>
    </>
  );
}

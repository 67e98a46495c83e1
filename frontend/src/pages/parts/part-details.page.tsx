import { useQuery } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { EmptyState } from '../../components/feedback/empty-state';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { DataTable } from '../../components/tables/data-table';
import { CurveSpread } from '../../features/curve-spread/curve-spread';
import { curveSpreadQueries } from '../../features/curve-spread/curve-spread.queries';
import { detailChoiceColumns } from '../../features/detail-choices/detail-choices.columns';
import { detailChoiceQueries } from '../../features/detail-choices/detail-choices.queries';
import styles from '../../features/life/part-life.module.css';
import { rigQueries } from '../../features/rig/rig.queries';
import { vesselQueries } from '../../features/vessels/vessels.queries';
import { useFormat } from '../../lib/formatting/use-format';

/** What each detail of a part stands on, and who confirmed it. */
export function PartDetailsPage() {
  const { partId = '' } = useParams();
  const format = useFormat();
  const part = useQuery(rigQueries.part(partId));
  const choices = useQuery(detailChoiceQueries.ofPart(partId));
  const spread = useQuery(curveSpreadQueries.ofPart(partId));
  const vessel = useQuery({
    ...vesselQueries.detail(part.data?.vesselId ?? ''),
    enabled: part.data !== undefined,
  });
  return (
    <QueryView query={part} loadingLabel="Loading the part">
      {(fitted) => (
        <>
          <PageHeading
            title="What each detail stands on"
            above={<Link to={paths.part.to(fitted.id)}>{fitted.positionLabel}</Link>}
          />
          <QueryView query={vessel}>
            {(found) => (
              <QueryView query={choices}>
                {({ items }) =>
                  items.length === 0 ? (
                    <EmptyState title="No details">
                      <p>This part is kept by its calendar; no fatigue curve is used on it.</p>
                    </EmptyState>
                  ) : (
                    <>
                      <p>
                        Curve, bending and factor come from the description of the part until somebody who
                        looked decides otherwise, with evidence.
                      </p>
                      <DataTable
                        caption="Details and what they stand on"
                        stackOnPhone
                        rows={items}
                        columns={detailChoiceColumns({
                          partId: fitted.id,
                          format,
                          zone: found.zone,
                          mayChange: found.permissions.includes('rig:update') && fitted.removedOn === null,
                        })}
                        rowKey={(item) => item.key}
                      />
                    </>
                  )
                }
              </QueryView>
            )}
          </QueryView>
          {fitted.kindOfWire === 'strand' && (
            <section className={styles.section} aria-labelledby="strand-curves">
              <h2 id="strand-curves">Strand curves side by side</h2>
              <QueryView query={spread}>{(loaded) => <CurveSpread spread={loaded} />}</QueryView>
            </section>
          )}
        </>
      )}
    </QueryView>
  );
}

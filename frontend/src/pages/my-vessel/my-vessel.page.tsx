import type { FleetRowDto } from '@stayledger/shared/contracts/vessels';
import { useInfiniteQuery, useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { Cautions } from '../../components/cautions/cautions';
import { EmptyState } from '../../components/feedback/empty-state';
import { QueryView } from '../../components/feedback/query-view';
import { PlainSelect } from '../../components/forms/plain-fields';
import { PageHeading } from '../../components/page-heading/page-heading';
import { OwnerView } from '../../features/my-vessel/owner-view';
import styles from '../../features/my-vessel/my-vessel.module.css';
import { OwnerPlan } from '../../features/rerig-schedules/owner-plan';
import { rerigQueries } from '../../features/rerig-schedules/rerig-schedules.queries';
import { rigQueries } from '../../features/rig/rig.queries';
import { vesselQueries } from '../../features/vessels/vessels.queries';

export function MyVesselPage() {
  const [search, setSearch] = useSearchParams();
  const vessels = useInfiniteQuery(vesselQueries.list({ sort: 'due' }));
  return (
    <div className={styles.column}>
      <QueryView query={vessels} loadingLabel="Opening your vessel">
        {(data) => {
          const rows = data.pages.flatMap((page) => page.items);
          const chosen = rows.find(({ id }) => id === search.get('vessel')) ?? rows[0];
          if (!chosen) return <NoVessel />;
          return (
            <>
              {rows.length > 1 ? (
                <VesselChoice rows={rows} chosen={chosen.id} onChoose={(id) => setSearch({ vessel: id })} />
              ) : null}
              <OwnedVessel key={chosen.id} vesselId={chosen.id} />
            </>
          );
        }}
      </QueryView>
    </div>
  );
}

function OwnedVessel({ vesselId }: { vesselId: string }) {
  const vessel = useQuery(vesselQueries.detail(vesselId));
  const rig = useQuery(rigQueries.ofVessel(vesselId));
  const plan = useQuery(vesselQueries.usagePlan(vesselId));
  const schedule = useQuery(rerigQueries.ofVessel(vesselId));
  return (
    <QueryView query={vessel} loadingLabel="Opening your vessel">
      {(data) => (
        <>
          <PageHeading title={data.name} below={`Looked after by ${data.firmName}`} />
          <QueryView query={rig}>
            {({ items }) => (
              <QueryView query={plan}>
                {({ plan: stated }) => (
                  <OwnerView
                    vessel={data}
                    positions={items}
                    hasPlan={stated !== null}
                    nextVisit={
                      schedule.data?.plan || schedule.data?.draftHidden ? (
                        <OwnerPlan vessel={data} schedule={schedule.data} />
                      ) : undefined
                    }
                  />
                )}
              </QueryView>
            )}
          </QueryView>
          <Cautions plain />
        </>
      )}
    </QueryView>
  );
}

function VesselChoice({
  rows,
  chosen,
  onChoose,
}: {
  rows: FleetRowDto[];
  chosen: string;
  onChoose: (id: string) => void;
}) {
  return (
    <div className={styles.choose}>
      <PlainSelect label="Vessel" value={chosen} onChange={(event) => onChoose(event.target.value)}>
        {rows.map((row) => (
          <option key={row.id} value={row.id}>
            {row.name}
          </option>
        ))}
      </PlainSelect>
    </div>
  );
}

function NoVessel() {
  return (
    <>
      <PageHeading title="My vessel" />
      <EmptyState title="No vessel yet">
        <p>
          Your vessel will stand here once the firm that looks after its rig has registered it and named you
          as its owner. Ask them, and give them the e-mail address you sign in with.
        </p>
      </EmptyState>
    </>
  );
}

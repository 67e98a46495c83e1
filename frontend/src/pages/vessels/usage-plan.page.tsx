import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { UsagePlanForm } from '../../features/vessels/usage-plan-form';
import { vesselQueries } from '../../features/vessels/vessels.queries';
import { useFormat } from '../../lib/formatting/use-format';
import { useSession } from '../../lib/session';
import { useRefresh } from '../../lib/use-refresh';

export function UsagePlanPage() {
  const { vesselId = '' } = useParams();
  const navigate = useNavigate();
  const refresh = useRefresh();
  const format = useFormat();
  const isOwnerOnly = !useSession().hasRole('surveyor', 'rigger');
  const vessel = useQuery(vesselQueries.detail(vesselId));
  const plan = useQuery(vesselQueries.usagePlan(vesselId));
  const back = isOwnerOnly ? paths.myVessel.pattern : paths.vessel.to(vesselId);
  return (
    <QueryView query={vessel}>
      {(data) => (
        <>
          <PageHeading
            title={`Planned sailing of ${data.name}`}
            above={<Link to={back}>{data.name}</Link>}
            below="Allowance used so far and the hours still to be sailed make a date. Without a plan there is none."
          />
          <QueryView query={plan}>
            {({ plan: stated }) => (
              <>
                {stated ? (
                  <p className="soft">
                    Stated by {stated.statedByName} on {format.instant(stated.updatedAt, data.zone)}.
                  </p>
                ) : null}
                <UsagePlanForm
                  key={stated?.version ?? 0}
                  vesselId={data.id}
                  plan={stated}
                  cancelTo={back}
                  onReload={() => void plan.refetch()}
                  onDone={async () => {
                    await refresh();
                    await navigate(back);
                  }}
                />
              </>
            )}
          </QueryView>
        </>
      )}
    </QueryView>
  );
}

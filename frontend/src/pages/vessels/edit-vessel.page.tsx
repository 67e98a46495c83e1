import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { VesselForm } from '../../features/vessels/vessel-form';
import { vesselQueries } from '../../features/vessels/vessels.queries';
import { useRefresh } from '../../lib/use-refresh';

export function EditVesselPage() {
  const { vesselId = '' } = useParams();
  const navigate = useNavigate();
  const refresh = useRefresh();
  const query = useQuery(vesselQueries.detail(vesselId));
  return (
    <QueryView query={query}>
      {(vessel) => (
        <>
          <PageHeading
            title={`Edit ${vessel.name}`}
            above={<Link to={paths.vessel.to(vessel.id)}>{vessel.name}</Link>}
          />
          {/* A new version is a new form: what it showed before was another state. */}
          <VesselForm
            key={vessel.version}
            vessel={vessel}
            cancelTo={paths.vessel.to(vessel.id)}
            onReload={() => void query.refetch()}
            onDone={async () => {
              await refresh();
              await navigate(paths.vessel.to(vessel.id));
            }}
          />
        </>
      )}
    </QueryView>
  );
}

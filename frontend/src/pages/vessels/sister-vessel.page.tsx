import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { SisterStart } from '../../features/rig-start/sister-start';
import { vesselQueries } from '../../features/vessels/vessels.queries';
import { useRefresh } from '../../lib/use-refresh';

export function SisterVesselPage() {
  const { vesselId = '' } = useParams();
  const navigate = useNavigate();
  const refresh = useRefresh();
  const query = useQuery(vesselQueries.detail(vesselId));
  return (
    <QueryView query={query}>
      {(vessel) => (
        <>
          <PageHeading
            title={`Sister vessel of ${vessel.name}`}
            above={<Link to={paths.vessel.to(vessel.id)}>{vessel.name}</Link>}
            below="A new vessel that starts with the same places and geometry."
          />
          <SisterStart
            vessel={vessel}
            onDone={async (sister) => {
              await refresh();
              await navigate(paths.vessel.to(sister.id));
            }}
          />
        </>
      )}
    </QueryView>
  );
}

import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { PositionForm } from '../../features/rig/position-form';
import { vesselQueries } from '../../features/vessels/vessels.queries';
import { useRefresh } from '../../lib/use-refresh';

export function AddPositionPage() {
  const { vesselId = '' } = useParams();
  const navigate = useNavigate();
  const refresh = useRefresh();
  const query = useQuery(vesselQueries.detail(vesselId));
  return (
    <QueryView query={query}>
      {(vessel) => (
        <>
          <PageHeading
            title="Add a position"
            above={<Link to={paths.vessel.to(vessel.id)}>{vessel.name}</Link>}
            below="A position is a place on the rig. The part fitted in it comes next, and may change; the position stays."
          />
          <PositionForm
            vesselId={vessel.id}
            cancelTo={paths.vessel.to(vessel.id)}
            onDone={async (position) => {
              await refresh();
              await navigate(paths.fitPart.to(vessel.id, position.id));
            }}
          />
        </>
      )}
    </QueryView>
  );
}

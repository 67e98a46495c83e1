import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { PositionForm } from '../../features/rig/position-form';
import { rigQueries } from '../../features/rig/rig.queries';
import { useRefresh } from '../../lib/use-refresh';
import { NotFoundPage } from '../not-found/not-found.page';

export function EditPositionPage() {
  const { vesselId = '', positionId = '' } = useParams();
  const navigate = useNavigate();
  const refresh = useRefresh();
  const query = useQuery(rigQueries.ofVessel(vesselId));
  const back = paths.vessel.to(vesselId);
  return (
    <QueryView query={query}>
      {({ items }) => {
        const position = items.find(({ id }) => id === positionId);
        if (!position) return <NotFoundPage />;
        return (
          <>
            <PageHeading title={`Edit ${position.label}`} above={<Link to={back}>Rig</Link>} />
            <PositionForm
              key={position.version}
              vesselId={vesselId}
              position={position}
              cancelTo={back}
              onReload={() => void query.refetch()}
              onDone={async () => {
                await refresh();
                await navigate(back);
              }}
            />
          </>
        );
      }}
    </QueryView>
  );
}

import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { GeometryForm } from '../../features/rig/geometry-form';
import { geometryQueries } from '../../features/rig/geometry.queries';
import { rigQueries } from '../../features/rig/rig.queries';
import { useRefresh } from '../../lib/use-refresh';

export function RigGeometryPage() {
  const { vesselId = '' } = useParams();
  const navigate = useNavigate();
  const refresh = useRefresh();
  const drawn = useQuery(geometryQueries.ofVessel(vesselId));
  const rig = useQuery(rigQueries.ofVessel(vesselId));
  const back = paths.vessel.to(vesselId);
  return (
    <QueryView query={drawn}>
      {(found) => (
        <QueryView query={rig}>
          {({ items }) => (
            <>
              <PageHeading
                title="Geometry of the rig"
                above={<Link to={back}>Rig</Link>}
                below={
                  found.source === 'suggested'
                    ? 'Nobody has entered these figures: they are what is usual for the type and length. Correct what you have measured.'
                    : 'As somebody entered it. The drawing and the lengths of the stays follow from it; loads and dates do not.'
                }
              />
              <GeometryForm
                key={found.version ?? 0}
                vesselId={vesselId}
                drawn={found}
                positions={items}
                cancelTo={back}
                onReload={() => void drawn.refetch()}
                onDone={async () => {
                  await refresh();
                  await navigate(back);
                }}
              />
            </>
          )}
        </QueryView>
      )}
    </QueryView>
  );
}

import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { RemovePartForm } from '../../features/rig/remove-part-form';
import { rigQueries } from '../../features/rig/rig.queries';
import { browserZone, clock } from '../../lib/clock';
import { useFormat } from '../../lib/formatting/use-format';
import { useRefresh } from '../../lib/use-refresh';

export function RemovePartPage() {
  const { partId = '' } = useParams();
  const navigate = useNavigate();
  const refresh = useRefresh();
  const format = useFormat();
  const query = useQuery(rigQueries.part(partId));
  return (
    <QueryView query={query}>
      {(part) => (
        <>
          <PageHeading
            title={`Take off the part: ${part.positionLabel}`}
            above={<Link to={paths.part.to(part.id)}>{part.positionLabel}</Link>}
            below="Its account ends on that day and is kept. The position becomes free for a new part, with an account of its own."
          />
          {part.removedOn ? (
            <p>
              Already taken off on {format.day(part.removedOn)}: {part.removedReason}
            </p>
          ) : (
            <RemovePartForm
              key={part.version}
              part={part}
              todayOn={clock.todayOn(browserZone())}
              cancelTo={paths.part.to(part.id)}
              onReload={() => void query.refetch()}
              onDone={async (removed) => {
                await refresh();
                await navigate(paths.vessel.to(removed.vesselId));
              }}
            />
          )}
        </>
      )}
    </QueryView>
  );
}

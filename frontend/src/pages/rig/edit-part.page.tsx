import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { PartMark } from '../../components/part-mark/part-mark';
import { referenceQueries } from '../../features/reference/reference.queries';
import { AssemblyStrength } from '../../features/rig/assembly-strength';
import { PartForm } from '../../features/rig/part-form';
import { rigQueries } from '../../features/rig/rig.queries';
import { browserZone, clock } from '../../lib/clock';
import { useRefresh } from '../../lib/use-refresh';

export function EditPartPage() {
  const { partId = '' } = useParams();
  const navigate = useNavigate();
  const refresh = useRefresh();
  const query = useQuery(rigQueries.part(partId));
  const constructions = useQuery(referenceQueries.constructions());
  return (
    <QueryView query={query}>
      {(part) => (
        <>
          <PageHeading
            title={`Edit the part: ${part.positionLabel}`}
            above={<Link to={paths.part.to(part.id)}>{part.positionLabel}</Link>}
            below="For what was registered wrongly or was not known. A part that was exchanged is taken off, and the new one fitted."
            mark={<PartMark standing={part.standing} kindOfWire={part.kindOfWire} size={48} />}
          />
          <AssemblyStrength part={part} />
          <QueryView query={constructions}>
            {({ items }) => (
              <PartForm
                key={part.version}
                positionId={part.positionId}
                part={part}
                constructions={items}
                todayOn={clock.todayOn(browserZone())}
                cancelTo={paths.part.to(part.id)}
                onReload={() => void query.refetch()}
                onDone={async () => {
                  await refresh();
                  await navigate(paths.part.to(part.id));
                }}
              />
            )}
          </QueryView>
        </>
      )}
    </QueryView>
  );
}

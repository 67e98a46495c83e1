import { isTwin } from '@stayledger/shared/rig/load-basis';
import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { EmptyState } from '../../components/feedback/empty-state';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { ButtonLink } from '../../components/plain-button/plain-button';
import { referenceQueries } from '../../features/reference/reference.queries';
import { PartForm } from '../../features/rig/part-form';
import { rigQueries } from '../../features/rig/rig.queries';
import { browserZone, clock } from '../../lib/clock';
import { useRefresh } from '../../lib/use-refresh';
import { NotFoundPage } from '../not-found/not-found.page';

export function FitPartPage() {
  const { vesselId = '', positionId = '' } = useParams();
  const navigate = useNavigate();
  const refresh = useRefresh();
  const rig = useQuery(rigQueries.ofVessel(vesselId));
  const constructions = useQuery(referenceQueries.constructions());
  const back = paths.vessel.to(vesselId);
  return (
    <QueryView query={rig}>
      {({ items }) => {
        const position = items.find(({ id }) => id === positionId);
        if (!position) return <NotFoundPage />;
        return (
          <>
            <PageHeading
              title={`Fit a part: ${position.label}`}
              above={<Link to={back}>Rig</Link>}
              below="The account of a part begins with it. What is not known may stay empty; it is then said, not guessed."
            />
            {position.part ? (
              <EmptyState
                title="This position is taken"
                actions={
                  <ButtonLink to={paths.removePart.to(position.part.id)}>Take the old part off</ButtonLink>
                }
              >
                <p>
                  {position.part.constructionName} is fitted here. Take it off first: its account ends on that
                  day, and a new one begins with the new part.
                </p>
              </EmptyState>
            ) : (
              <QueryView query={constructions}>
                {({ items: known }) => (
                  <PartForm
                    positionId={position.id}
                    twinIsEmpty={items.some((other) => isTwin(position, other) && other.part === null)}
                    constructions={known}
                    todayOn={clock.todayOn(browserZone())}
                    cancelTo={back}
                    onDone={async (part) => {
                      await refresh();
                      await navigate(paths.part.to(part.id));
                    }}
                  />
                )}
              </QueryView>
            )}
          </>
        );
      }}
    </QueryView>
  );
}

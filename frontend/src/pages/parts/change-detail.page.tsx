import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { DetailChoiceForm } from '../../features/detail-choices/detail-choice-form';
import { detailChoiceQueries } from '../../features/detail-choices/detail-choices.queries';
import { rigQueries } from '../../features/rig/rig.queries';
import { NotFoundPage } from '../not-found/not-found.page';

/** Puts what a person knows in place of what a detail is given by default. */
export function ChangeDetailPage() {
  const { partId = '', detailKey = '' } = useParams();
  const navigate = useNavigate();
  const part = useQuery(rigQueries.part(partId));
  const choices = useQuery(detailChoiceQueries.ofPart(partId));
  const back = paths.partDetails.to(partId);
  return (
    <QueryView query={part} loadingLabel="Loading the part">
      {(fitted) => (
        <QueryView query={choices}>
          {({ items }) => {
            const item = items.find(({ key }) => key === detailKey);
            if (!item) return <NotFoundPage />;
            return (
              <>
                <PageHeading
                  title={`Change the ${item.name}`}
                  above={<Link to={back}>{fitted.positionLabel}, details</Link>}
                  below={item.explanation}
                />
                {fitted.removedOn === null ? (
                  <DetailChoiceForm
                    partId={fitted.id}
                    item={item}
                    cancelTo={back}
                    onDone={() => navigate(back)}
                  />
                ) : (
                  <p>This part has been taken off; its details stay as they were.</p>
                )}
              </>
            );
          }}
        </QueryView>
      )}
    </QueryView>
  );
}

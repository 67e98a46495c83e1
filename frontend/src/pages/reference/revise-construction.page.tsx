import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { ConstructionForm } from '../../features/reference/construction-form';
import { referenceQueries } from '../../features/reference/reference.queries';
import { useRefresh } from '../../lib/use-refresh';
import { NotFoundPage } from '../not-found/not-found.page';

export function ReviseConstructionPage() {
  const { constructionId = '' } = useParams();
  const navigate = useNavigate();
  const refresh = useRefresh();
  const constructions = useQuery(referenceQueries.constructions());
  return (
    <QueryView query={constructions}>
      {({ items }) => {
        const construction = items.find(({ id, firm }) => id === constructionId && firm !== null);
        if (!construction) return <NotFoundPage />;
        return (
          <>
            <PageHeading
              title={`Correct ${construction.name}`}
              above={<Link to={paths.reference.pattern}>Reference data</Link>}
              below={`The correction is kept as version ${construction.version + 1}. Parts fitted with version ${construction.version} keep it.`}
            />
            <ConstructionForm
              key={construction.version}
              construction={construction}
              shipped={items.filter(({ firm }) => firm === null)}
              cancelTo={paths.reference.pattern}
              onReload={() => void constructions.refetch()}
              onDone={async () => {
                await refresh();
                await navigate(paths.reference.pattern);
              }}
            />
          </>
        );
      }}
    </QueryView>
  );
}

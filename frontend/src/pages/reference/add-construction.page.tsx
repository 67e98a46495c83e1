import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { ConstructionForm } from '../../features/reference/construction-form';
import { referenceQueries } from '../../features/reference/reference.queries';
import { useRefresh } from '../../lib/use-refresh';

export function AddConstructionPage() {
  const navigate = useNavigate();
  const refresh = useRefresh();
  const constructions = useQuery(referenceQueries.constructions());
  return (
    <>
      <PageHeading
        title="Add a construction"
        above={<Link to={paths.reference.pattern}>Reference data</Link>}
        below="Wire, rod or rope by a maker’s table or a certificate. It is kept for your firm alone and can be fitted at once."
      />
      <QueryView query={constructions}>
        {({ items }) => (
          <ConstructionForm
            shipped={items.filter(({ firm }) => firm === null)}
            cancelTo={paths.reference.pattern}
            onDone={async () => {
              await refresh();
              await navigate(paths.reference.pattern);
            }}
          />
        )}
      </QueryView>
    </>
  );
}

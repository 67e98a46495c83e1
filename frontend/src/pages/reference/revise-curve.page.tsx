import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { CurveForm } from '../../features/reference/curve-form';
import { referenceQueries } from '../../features/reference/reference.queries';
import { useRefresh } from '../../lib/use-refresh';

export function ReviseCurvePage() {
  const { curveId = '' } = useParams();
  const navigate = useNavigate();
  const refresh = useRefresh();
  const query = useQuery(referenceQueries.curve(curveId));
  return (
    <QueryView query={query} loadingLabel="Opening the curve">
      {(curve) => (
        <>
          <PageHeading
            title={`Correct ${curve.name}`}
            above={<Link to={paths.curve.to(curve.id)}>{curve.name}</Link>}
            below={`The correction is kept as version ${curve.version + 1}. Accounts posted with version ${curve.version} keep it.`}
          />
          <CurveForm
            key={curve.version}
            curve={curve}
            cancelTo={paths.curve.to(curve.id)}
            onReload={() => void query.refetch()}
            onDone={async () => {
              await refresh();
              await navigate(paths.curve.to(curve.id));
            }}
          />
        </>
      )}
    </QueryView>
  );
}

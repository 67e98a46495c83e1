import { Link, useNavigate } from 'react-router-dom';
import { paths } from '../../app/paths';
import { PageHeading } from '../../components/page-heading/page-heading';
import { CurveForm } from '../../features/reference/curve-form';
import { useRefresh } from '../../lib/use-refresh';

export function AddCurvePage() {
  const navigate = useNavigate();
  const refresh = useRefresh();
  return (
    <>
      <PageHeading
        title="Add a curve"
        above={<Link to={paths.reference.pattern}>Reference data</Link>}
        below="From tests of your own or from a source that is not in the list. It is kept for your firm alone and stands apart from the curves of the product."
      />
      <CurveForm
        cancelTo={paths.reference.pattern}
        onDone={async ({ id }) => {
          await refresh();
          await navigate(paths.curve.to(id));
        }}
      />
    </>
  );
}

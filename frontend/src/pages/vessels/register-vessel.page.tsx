import { Link, useNavigate } from 'react-router-dom';
import { paths } from '../../app/paths';
import { PageHeading } from '../../components/page-heading/page-heading';
import { VesselForm } from '../../features/vessels/vessel-form';
import { useRefresh } from '../../lib/use-refresh';

export function RegisterVesselPage() {
  const navigate = useNavigate();
  const refresh = useRefresh();
  return (
    <>
      <PageHeading title="Register a vessel" above={<Link to={paths.fleet.pattern}>Fleet</Link>} />
      <VesselForm
        cancelTo={paths.fleet.pattern}
        onDone={async (vessel) => {
          await refresh();
          await navigate(paths.vessel.to(vessel.id));
        }}
      />
    </>
  );
}

import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { FileStart } from '../../features/rig-start/file-start';
import { PairStart } from '../../features/rig-start/pair-start';
import { TemplateStart } from '../../features/rig-start/template-start';
import { vesselQueries } from '../../features/vessels/vessels.queries';
import { useRefresh } from '../../lib/use-refresh';

/** Many places at once: by rig type, as a pair, or from a file. */
export function StartRigPage() {
  const { vesselId = '' } = useParams();
  const navigate = useNavigate();
  const refresh = useRefresh();
  const query = useQuery(vesselQueries.detail(vesselId));
  const done = async () => {
    await refresh();
    await navigate(paths.vessel.to(vesselId));
  };
  return (
    <QueryView query={query}>
      {(vessel) => (
        <>
          <PageHeading
            title="Add many places at once"
            above={<Link to={paths.vessel.to(vessel.id)}>{vessel.name}</Link>}
            below="Start from the type of the rig, add a pair, or read a file. Nothing that is on the rig already is changed."
          />
          <TemplateStart vessel={vessel} onDone={done} />
          <PairStart vesselId={vessel.id} onDone={done} />
          <FileStart vesselId={vessel.id} onDone={done} />
        </>
      )}
    </QueryView>
  );
}

import { useQuery } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { AddLoadLog } from '../../features/load-logs/add-load-log';
import { rigQueries } from '../../features/rig/rig.queries';
import { vesselQueries } from '../../features/vessels/vessels.queries';

/** Choosing a recording, checking how it is read, and sending it. */
export function AddLoadLogPage() {
  const { vesselId = '' } = useParams();
  const vessel = useQuery(vesselQueries.detail(vesselId));
  const rig = useQuery(rigQueries.ofVessel(vesselId));
  return (
    <QueryView query={vessel}>
      {({ id, name, zone }) => (
        <>
          <PageHeading
            title="Add load log"
            above={
              <>
                <Link to={paths.vessel.to(id)}>{name}</Link>
                {' / '}
                <Link to={paths.loadLogs.to(id)}>Loads</Link>
              </>
            }
            below="A recording of rig loads. After counting you review it; nothing reaches the ledger before you post it."
          />
          <QueryView query={rig}>
            {({ items }) => <AddLoadLog vesselId={id} zone={zone} positions={items} />}
          </QueryView>
        </>
      )}
    </QueryView>
  );
}

import { useQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { QueryView } from '../../components/feedback/query-view';
import { LoadLogList } from '../../features/load-logs/load-log-list';
import { vesselQueries } from '../../features/vessels/vessels.queries';

/** The Loads tab of a vessel's page. */
export function LoadLogListPage() {
  const { vesselId = '' } = useParams();
  const vessel = useQuery(vesselQueries.detail(vesselId));
  return (
    <QueryView query={vessel}>
      {({ id, zone, permissions }) => (
        <LoadLogList vesselId={id} zone={zone} mayUpload={permissions.includes('load-logs:upload')} />
      )}
    </QueryView>
  );
}

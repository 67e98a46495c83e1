import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { rerigQueries } from '../../features/rerig-schedules/rerig-schedules.queries';
import { YardTermsForm } from '../../features/rerig-schedules/yard-terms-form';

export function YardTermsPage() {
  const terms = useQuery(rerigQueries.yardTerms());
  return (
    <QueryView query={terms} loadingLabel="Opening the terms">
      {(stored) => (
        <>
          <PageHeading
            title="Prices and seasons of the yard"
            above={<Link to={paths.fleet.pattern}>Fleet</Link>}
            below={
              stored.version === null
                ? `${stored.firmName} has not stated its own terms yet. What stands here is invented, to start from.`
                : `What ${stored.firmName} asks and when its yard is open. The next plan of each vessel is made from it.`
            }
          />
          <YardTermsForm key={stored.version ?? 0} stored={stored} />
        </>
      )}
    </QueryView>
  );
}

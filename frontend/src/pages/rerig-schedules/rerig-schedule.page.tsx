import { useQuery } from '@tanstack/react-query';
import { Cautions } from '../../components/cautions/cautions';
import { QueryView } from '../../components/feedback/query-view';
import { RerigScheduleView } from '../../features/rerig-schedules/rerig-schedule-view';
import { rerigQueries } from '../../features/rerig-schedules/rerig-schedules.queries';
import { useVessel } from '../../features/vessels/use-vessel';

/** The Re-rig schedule tab of a vessel's page. */
export function RerigSchedulePage() {
  const vessel = useVessel();
  const schedule = useQuery(rerigQueries.ofVessel(vessel.id));
  return (
    <>
      <QueryView query={schedule} loadingLabel="Opening the schedule">
        {(data) => <RerigScheduleView vessel={vessel} schedule={data} />}
      </QueryView>
      <Cautions />
    </>
  );
}

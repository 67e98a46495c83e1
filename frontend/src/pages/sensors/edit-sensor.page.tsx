import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { rigQueries } from '../../features/rig/rig.queries';
import { SensorForm } from '../../features/sensors/sensor-form';
import { sensorQueries } from '../../features/sensors/sensors.queries';
import { vesselQueries } from '../../features/vessels/vessels.queries';
import { clock } from '../../lib/clock';
import { useRefresh } from '../../lib/use-refresh';
import { NotFoundPage } from '../not-found/not-found.page';

/** Adds a sensor, or changes the one in the address. */
export function EditSensorPage() {
  const { vesselId = '', sensorId } = useParams();
  const navigate = useNavigate();
  const refresh = useRefresh();
  const vesselQuery = useQuery(vesselQueries.detail(vesselId));
  const rig = useQuery(rigQueries.ofVessel(vesselId));
  const sensors = useQuery(sensorQueries.ofVessel(vesselId));
  const back = paths.sensors.to(vesselId);
  return (
    <QueryView query={vesselQuery}>
      {(vessel) => (
        <QueryView query={rig}>
          {({ items: positions }) => (
            <QueryView query={sensors}>
              {({ items }) => {
                const sensor = items.find(({ id }) => id === sensorId);
                if (sensorId && !sensor) return <NotFoundPage />;
                return (
                  <>
                    <PageHeading
                      title={sensor ? `Edit ${sensor.name}` : 'Add a sensor'}
                      above={<Link to={back}>Sensors</Link>}
                    />
                    <SensorForm
                      key={sensor?.version ?? 0}
                      vesselId={vesselId}
                      positions={positions}
                      sensor={sensor}
                      todayOn={clock.todayOn(vessel.zone)}
                      cancelTo={back}
                      onReload={() => void sensors.refetch()}
                      onDone={async () => {
                        await refresh();
                        await navigate(back);
                      }}
                    />
                  </>
                );
              }}
            </QueryView>
          )}
        </QueryView>
      )}
    </QueryView>
  );
}

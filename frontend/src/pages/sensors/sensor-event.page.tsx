import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { SensorEventForm } from '../../features/sensors/sensor-event-form';
import { sensorQueries } from '../../features/sensors/sensors.queries';
import { vesselQueries } from '../../features/vessels/vessels.queries';
import { clock } from '../../lib/clock';
import { useRefresh } from '../../lib/use-refresh';
import { NotFoundPage } from '../not-found/not-found.page';

export function SensorEventPage() {
  const { vesselId = '', sensorId = '' } = useParams();
  const navigate = useNavigate();
  const refresh = useRefresh();
  const vesselQuery = useQuery(vesselQueries.detail(vesselId));
  const sensors = useQuery(sensorQueries.ofVessel(vesselId));
  const back = paths.sensors.to(vesselId);
  return (
    <QueryView query={vesselQuery}>
      {(vessel) => (
        <QueryView query={sensors}>
          {({ items }) => {
            const sensor = items.find(({ id }) => id === sensorId);
            if (!sensor) return <NotFoundPage />;
            return (
              <>
                <PageHeading
                  title={`Record a check of ${sensor.name}`}
                  above={<Link to={back}>Sensors</Link>}
                  below="What is recorded here is kept as it is. A mistake is set right by recording it again."
                />
                <SensorEventForm
                  sensorId={sensor.id}
                  todayOn={clock.todayOn(vessel.zone)}
                  cancelTo={back}
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
  );
}

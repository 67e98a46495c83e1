import { useQuery } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { EmptyState } from '../../components/feedback/empty-state';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { ButtonLink } from '../../components/plain-button/plain-button';
import { SensorList } from '../../features/sensors/sensor-list';
import { sensorQueries } from '../../features/sensors/sensors.queries';
import { vesselQueries } from '../../features/vessels/vessels.queries';

export function SensorsPage() {
  const { vesselId = '' } = useParams();
  const vessel = useQuery(vesselQueries.detail(vesselId));
  const sensors = useQuery(sensorQueries.ofVessel(vesselId));
  return (
    <QueryView query={vessel}>
      {(found) => {
        const mayUpdate = found.permissions.includes('rig:update');
        const add = mayUpdate ? (
          <ButtonLink to={paths.addSensor.to(found.id)}>Add a sensor</ButtonLink>
        ) : null;
        return (
          <>
            <PageHeading
              title="Sensors"
              above={<Link to={paths.vessel.to(found.id)}>{found.name}</Link>}
              below="What measures the loads of this rig, and how far its zero and scale can be relied on."
              actions={add}
            />
            <QueryView query={sensors} loadingLabel="Reading the sensors">
              {({ items }) =>
                items.length === 0 ? (
                  <EmptyState title="No sensors yet" actions={add}>
                    <p>
                      Each sensor will stand here with the place it measures, its checks and what it still
                      wants. Without one, a part has no load basis and is not assessed for fatigue.
                    </p>
                  </EmptyState>
                ) : (
                  <SensorList sensors={items} mayUpdate={mayUpdate} />
                )
              }
            </QueryView>
          </>
        );
      }}
    </QueryView>
  );
}

import type { SensorDto, SensorEventDto } from '@stayledger/shared/contracts/sensors';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Attention } from '../../components/feedback/attention';
import { useFormat } from '../../lib/formatting/use-format';
import type { Formatter } from '../../lib/formatting/format';
import { EVENT_KIND_WORDS, RIG_STATE_WORDS, SENSOR_KIND_WORDS } from './sensor-words';
import styles from './sensors.module.css';

/** Sensors with what they measure, what they want and what was done to them. */
export function SensorList({ sensors, mayUpdate }: { sensors: readonly SensorDto[]; mayUpdate: boolean }) {
  const format = useFormat();
  return (
    <ul className={styles.list}>
      {sensors.map((sensor) => (
        <li key={sensor.id} className={styles.sensor}>
          <h2>{sensor.name}</h2>
          <p>
            {SENSOR_KIND_WORDS[sensor.kind]}
            {sensor.positionLabel ? `, measures ${sensor.positionLabel}` : ', not placed'}
            {sensor.fullScaleKn === null ? '' : `, full scale ${format.force(sensor.fullScaleKn)}`}
            {sensor.errorPercent === null ? '' : `, error class ${format.number(sensor.errorPercent, 2)} %`}
            {sensor.placedOn === null ? '' : `, placed on ${format.day(sensor.placedOn)}`}
            {sensor.removedOn === null ? '' : `, taken off on ${format.day(sensor.removedOn)}`}.
          </p>
          {sensor.wants.length > 0 ? (
            <Attention>
              Still wanted:
              <ul>
                {sensor.wants.map((want) => (
                  <li key={want}>{want}</li>
                ))}
              </ul>
            </Attention>
          ) : null}
          {sensor.events.length > 0 ? (
            <ul>
              {sensor.events.map((event) => (
                <li key={event.id}>{eventWords(event, format)}</li>
              ))}
            </ul>
          ) : null}
          {mayUpdate ? (
            <p className={styles.steps}>
              <Link
                to={paths.sensorEvent.to(sensor.vesselId, sensor.id)}
                aria-label={`Record a check of ${sensor.name}`}
              >
                Record a check
              </Link>
              <Link to={paths.editSensor.to(sensor.vesselId, sensor.id)} aria-label={`Edit ${sensor.name}`}>
                Edit
              </Link>
            </p>
          ) : null}
        </li>
      ))}
    </ul>
  );
}

function eventWords(event: SensorEventDto, format: Formatter): string {
  const words = [`${EVENT_KIND_WORDS[event.kind]} on ${format.day(event.doneOn)}`];
  if (event.readingKn !== null) words.push(`showed ${format.force(event.readingKn)}`);
  if (event.rigState !== null) words.push(`rig ${RIG_STATE_WORDS[event.rigState]}`);
  if (event.statedTensionKn !== null) words.push(`tension ${format.force(event.statedTensionKn)}`);
  if (event.batteryHours !== null) words.push(`good for ${format.hours(event.batteryHours)}`);
  words.push(`by ${event.recordedByName}`);
  return `${words.join(', ')}.${event.note ? ` ${event.note}` : ''}`;
}

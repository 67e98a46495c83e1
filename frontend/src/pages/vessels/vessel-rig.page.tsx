import type { RigDto } from '@stayledger/shared/contracts/rig';
import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { paths } from '../../app/paths';
import { EmptyState } from '../../components/feedback/empty-state';
import { QueryView } from '../../components/feedback/query-view';
import { ButtonLink } from '../../components/plain-button/plain-button';
import { CsvDownload } from '../../components/tables/csv-download';
import { DataTable } from '../../components/tables/data-table';
import { drawnRig } from '../../features/rig/drawn-rig';
import { geometryQueries } from '../../features/rig/geometry.queries';
import { RigElevation } from '../../features/rig/rig-elevation';
import { rigColumns } from '../../features/rig/rig-table.columns';
import { rigQueries } from '../../features/rig/rig.queries';
import styles from '../../features/rig/rig.module.css';
import { LoadBasisTable } from '../../features/sensors/load-basis-table';
import { sensorQueries } from '../../features/sensors/sensors.queries';
import { useVessel } from '../../features/vessels/use-vessel';
import { clock } from '../../lib/clock';
import { useFormat } from '../../lib/formatting/use-format';

export function VesselRigPage() {
  const vessel = useVessel();
  const rig = useQuery(rigQueries.ofVessel(vessel.id));
  const geometry = useQuery(geometryQueries.ofVessel(vessel.id));
  const bases = useQuery(sensorQueries.loadBases(vessel.id));
  const format = useFormat();
  const mayUpdate = vessel.permissions.includes('rig:update');
  const todayOn = clock.todayOn(vessel.zone);
  const columns = useMemo(
    () => rigColumns({ format, todayOn, zone: vessel.zone, mayUpdate }),
    [format, todayOn, vessel.zone, mayUpdate],
  );
  const addPosition = mayUpdate ? (
    <>
      <ButtonLink to={paths.startRig.to(vessel.id)}>Add many places at once</ButtonLink>
      <ButtonLink to={paths.addPosition.to(vessel.id)}>Add a position</ButtonLink>
    </>
  ) : null;
  return (
    <QueryView query={rig} loadingLabel="Opening the rig">
      {({ items }) =>
        items.length === 0 ? (
          <EmptyState title="No positions yet" actions={addPosition}>
            <p>
              The places of this rig will stand here in rig order, each with the part fitted in it. Start from
              the type of the rig or a file, or add a position, such as the port cap shroud; then fit a part.
            </p>
          </EmptyState>
        ) : (
          <>
            <p className={styles.summary}>{rigSummary(items)}</p>
            <QueryView query={geometry} loadingLabel="Drawing the rig">
              {(found) => (
                <RigElevation
                  name={vessel.name}
                  rig={drawnRig(found, items)}
                  todayOn={todayOn}
                  zone={vessel.zone}
                />
              )}
            </QueryView>
            <DataTable
              caption={`Positions and parts of ${vessel.name}`}
              stackOnPhone
              rows={items}
              columns={columns}
              rowKey={(position) => position.id}
            />
            <div className={styles.actions}>
              {addPosition}
              <ButtonLink to={paths.sensors.to(vessel.id)}>Sensors</ButtonLink>
              {mayUpdate ? (
                <ButtonLink to={paths.rigGeometry.to(vessel.id)}>Correct the geometry</ButtonLink>
              ) : null}
              {vessel.permissions.includes('vessels:register') ? (
                <ButtonLink to={paths.sisterVessel.to(vessel.id)}>Register a sister vessel</ButtonLink>
              ) : null}
              {vessel.permissions.includes('ledger:check') && (
                <ButtonLink to={paths.ledgerCheck.to(vessel.id)}>Check the ledger</ButtonLink>
              )}
              <CsvDownload name={`rig of ${vessel.name}`} rows={items} columns={columns} />
            </div>
            <section className={styles.bases}>
              <QueryView query={bases} loadingLabel="Looking where loads come from">
                {({ items: found }) => <LoadBasisTable bases={found} positions={items} />}
              </QueryView>
            </section>
          </>
        )
      }
    </QueryView>
  );
}

/** What is known and what is not, counted before any figure is read. */
function rigSummary(items: RigDto['items']): string {
  const standings = items.flatMap((position) => (position.part ? [position.part.standing] : []));
  const count = (test: (standing: (typeof standings)[number]) => boolean) => standings.filter(test).length;
  const counted: [number, string][] = [
    [count((standing) => standing.due === 'overdue'), 'overdue'],
    [count((standing) => standing.due === 'due'), 'due within twelve months'],
    [count((standing) => standing.assessment === 'assessed'), 'assessed from recorded loads'],
    [count((standing) => standing.assessment === 'not-assessed'), 'not assessed for fatigue'],
    [count((standing) => standing.assessment === 'calendar-only'), 'on the calendar only'],
    [
      items.length - standings.length,
      items.length - standings.length === 1 ? 'position empty' : 'positions empty',
    ],
  ];
  const said = counted.filter(([amount]) => amount > 0).map(([amount, words]) => `${amount} ${words}`);
  return `${items.length} ${items.length === 1 ? 'position' : 'positions'}: ${said.join(', ')}.`;
}

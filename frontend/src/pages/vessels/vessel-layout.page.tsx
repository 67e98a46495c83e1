import { useQuery } from '@tanstack/react-query';
import { Link, NavLink, Outlet, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { ButtonLink } from '../../components/plain-button/plain-button';
import { RIG_TYPE_WORDS, USE_KIND_WORDS } from '../../features/vessels/vessel-words';
import { vesselQueries } from '../../features/vessels/vessels.queries';
import { useFormat } from '../../lib/formatting/use-format';
import { useSession } from '../../lib/session';
import styles from '../../components/page-tabs/page-tabs.module.css';

/** Head of a vessel's pages; the tab below it gets the vessel through the outlet context (see use-vessel.ts). */
export function VesselLayoutPage() {
  const { vesselId = '' } = useParams();
  const vessel = useQuery(vesselQueries.detail(vesselId));
  const format = useFormat();
  const session = useSession();
  return (
    <QueryView query={vessel} loadingLabel="Opening the vessel">
      {(data) => (
        <>
          <PageHeading
            title={data.name}
            above={
              session.hasRole('surveyor', 'rigger') ? <Link to={paths.fleet.pattern}>Fleet</Link> : undefined
            }
            below={[
              RIG_TYPE_WORDS[data.rigType],
              USE_KIND_WORDS[data.useKind].toLowerCase(),
              data.lengthM === null ? null : format.length(data.lengthM),
              data.buildYear === null ? 'build year not known' : `built ${data.buildYear}`,
              data.homePort,
              `looked after by ${data.firmName}`,
            ]
              .filter(Boolean)
              .join(', ')}
            actions={
              <>
                {data.permissions.includes('usage:state') ? (
                  <ButtonLink to={paths.usagePlan.to(data.id)}>Planned sailing</ButtonLink>
                ) : null}
                {data.permissions.includes('vessels:update') ? (
                  <ButtonLink to={paths.editVessel.to(data.id)}>Edit</ButtonLink>
                ) : null}
              </>
            }
          />
          <nav aria-label={`Pages of ${data.name}`} className={styles.tabs}>
            <NavLink to={paths.vessel.to(data.id)} end>
              Rig
            </NavLink>
            {data.permissions.includes('load-logs:read') ? (
              <NavLink to={paths.loadLogs.to(data.id)}>Loads</NavLink>
            ) : null}
            {data.permissions.includes('rerig:read') ? (
              <NavLink to={paths.rerigSchedule.to(data.id)}>Re-rig schedule</NavLink>
            ) : null}
          </nav>
          <Outlet context={data} />
        </>
      )}
    </QueryView>
  );
}

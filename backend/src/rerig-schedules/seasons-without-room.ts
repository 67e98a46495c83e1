import type { EntityManager } from '@mikro-orm/postgresql';
import { STARTING_YARD_TERMS } from '@stayledger/shared/rerig-schedule/yard-terms';
import type { Vessel } from '../vessels/vessel.entity.js';
import { YardTermsRow } from './yard-terms.entity.js';

interface TakenRow {
  window_id: string;
  berths: number;
  hours: number;
}

/**
 * Ids of the seasons in which accepted and booked visits of the firm's other vessels take every berth or every rigger
 * hour. Counts the vessels within the reach of the running transaction: those of the firm, for its own people.
 */
export async function seasonsWithoutRoom(em: EntityManager, vessel: Vessel): Promise<string[]> {
  const row = await em.findOne(YardTermsRow, { firm: vessel.firm });
  const { seasons } = row?.terms ?? STARTING_YARD_TERMS;
  const taken = await em.execute<TakenRow[]>(
    `select visit ->> 'windowId' as window_id, count(*)::int as berths, sum((visit ->> 'hours')::float8) as hours
       from rerig_schedule s join vessel v on v.id = s.vessel_id join rerig_plan p on p.id = s.plan_id
            cross join lateral jsonb_array_elements(p.plan -> 'visits') as visit
      where v.firm_id = ? and v.id <> ? and s.state in ('accepted', 'booked')
      group by 1`,
    [vessel.firm, vessel.id],
  );
  return taken.flatMap(({ window_id, berths, hours }) => {
    // A window is called by its year and the season's own id: "2028-spring".
    const season = seasons.find(({ id }) => window_id.slice(5) === id);
    return season !== undefined && (berths >= season.berths || hours >= season.hours) ? [window_id] : [];
  });
}

import type { EntityManager } from '@mikro-orm/postgresql';
import { Firm } from '@stayledger/backend/firms/firm.entity';
import { Vessel } from '@stayledger/backend/persistence';
import type { RerigRequest } from '@stayledger/backend/rerig-schedules/rerig-request.entity';
import type { RerigSchedule } from '@stayledger/backend/rerig-schedules/rerig-schedule.entity';
import { YardTermsRow } from '@stayledger/backend/rerig-schedules/yard-terms.entity';
import type { PlanDecisions } from '@stayledger/shared/rerig-schedule/plan-input';
import type { PlanBasis, RegisterPart } from '@stayledger/shared/rerig-schedule/vessel-plan-input';
import { STARTING_YARD_TERMS } from '@stayledger/shared/rerig-schedule/yard-terms';

interface PartRow {
  id: string;
  kind: string;
  side: RegisterPart['side'];
  mast: string;
  label: string;
  kind_of_wire: RegisterPart['kindOfWire'];
  diameter_mm: number;
  length_m: number | null;
  fitted_on: string | null;
  replace_by_on: string | null;
}

/** Everything the plan of a vessel follows from, as the register, the ledger's dates and the firm's terms stand. */
export async function readPlanBasis(
  em: EntityManager,
  vessel: Vessel,
  schedule: RerigSchedule,
  request: RerigRequest,
  settled: { asOfOn: string; decisions: PlanDecisions },
): Promise<PlanBasis> {
  const firm = await em.findOneOrFail(Firm, vessel.firm);
  const stated = await em.findOne(YardTermsRow, { firm: vessel.firm });
  const rows = await em.execute<PartRow[]>(
    `select p.id, q.kind, q.side, q.mast, q.label, c.data ->> 'kindOfWire' as kind_of_wire, p.diameter_mm, p.length_m,
            p.fitted_on::text as fitted_on, s.replace_by_on::text as replace_by_on
       from fitted_part p join position q on q.id = p.position_id
            join construction c on c.id = p.construction_id and c.version = p.construction_version
            left join part_standing s on s.fitted_part_id = p.id
      where p.vessel_id = ? and p.removed_on is null and q.archived_at is null
      order by q.sort_order, q.label, p.id`,
    [vessel.id],
  );
  return {
    asOfOn: settled.asOfOn,
    horizonYears: schedule.horizonYears,
    currency: firm.currency,
    terms: stated?.terms ?? STARTING_YARD_TERMS,
    parts: rows.map((row) => ({
      partId: row.id,
      kind: row.kind,
      side: row.side,
      mast: row.mast,
      label: row.label,
      kindOfWire: row.kind_of_wire,
      diameterMm: row.diameter_mm,
      lengthM: row.length_m,
      fittedOn: row.fitted_on,
      replaceByOn: row.replace_by_on,
    })),
    absences: schedule.absences,
    fullSeasonIds: request.fullSeasonIds,
    decisions: settled.decisions,
  };
}

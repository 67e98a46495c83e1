import type { EntityManager } from '@mikro-orm/postgresql';
import { DEFAULT_HORIZON_YEARS } from '@stayledger/shared/rerig-schedule/plan-input';
import { STARTING_YARD_TERMS, type YardTerms } from '@stayledger/shared/rerig-schedule/yard-terms';
import { addMonths } from '@stayledger/shared/fatigue/life/days';
import { PLAN_RERIG } from '@stayledger/shared/queues/load-logs.queue';
import { newId } from '../../common/ids/new-id.js';
import { Job } from '../../jobs/job.entity.js';
import { RerigRequest } from '../../rerig-schedules/rerig-request.entity.js';
import { RerigSchedule } from '../../rerig-schedules/rerig-schedule.entity.js';
import { YardTermsRow } from '../../rerig-schedules/yard-terms.entity.js';

/** Invented prices of an invented yard, in øre: those to start from, which are in the order of euro cents, times this. */
const ORE_PER_STARTING_UNIT = 11;
/** The crane is away for a month, so many months after the first day. */
const CLOSED_FROM_MONTHS = 10;

/** Terms of the demo's yard, and a first plan of these vessels to be made once the service runs. */
export async function seedSchedules(
  em: EntityManager,
  demo: { firmId: string; riggerId: string; vesselIds: readonly string[]; firstDayOn: string; now: Date },
): Promise<void> {
  const { firmId, riggerId, vesselIds, firstDayOn, now } = demo;
  const stamps = { createdAt: now, updatedAt: now };
  em.persist(
    em.create(YardTermsRow, {
      id: newId(),
      firm: firmId,
      terms: yardTerms(firstDayOn),
      statedBy: riggerId,
      ...stamps,
    }),
  );
  await em.flush();
  for (const vessel of vesselIds) {
    const request = newId();
    await em.insert(RerigRequest, {
      id: request,
      vessel,
      number: 1,
      fullSeasonIds: [],
      askedBy: riggerId,
      createdAt: now,
    });
    em.persist(
      em.create(RerigSchedule, {
        id: newId(),
        vessel,
        state: 'draft',
        horizonYears: DEFAULT_HORIZON_YEARS,
        absences: [],
        request,
        ...stamps,
      }),
    );
    em.persist(
      em.create(Job, {
        id: newId(),
        kind: PLAN_RERIG,
        subjectId: request,
        vesselId: vessel,
        inputVersion: 1,
        state: 'queued',
        attempts: 0,
        progress: 0,
        createdAt: now,
      }),
    );
  }
  await em.flush();
}

function yardTerms(firstDayOn: string): YardTerms {
  const { visits, replacements, inspection, ...rest } = STARTING_YARD_TERMS;
  const inOre = <Terms extends { costMinor: number }>(terms: Terms): Terms => ({
    ...terms,
    costMinor: terms.costMinor * ORE_PER_STARTING_UNIT,
  });
  const priced = (terms: YardTerms['replacements']['strand']): YardTerms['replacements']['strand'] => ({
    ...terms,
    perPartMinor: terms.perPartMinor * ORE_PER_STARTING_UNIT,
    perMetreMillimetreMinor: terms.perMetreMillimetreMinor * ORE_PER_STARTING_UNIT,
  });
  const fromOn = addMonths(firstDayOn, CLOSED_FROM_MONTHS);
  return {
    ...rest,
    visits: {
      aloft: inOre(visits.aloft),
      'mast-out-afloat': inOre(visits['mast-out-afloat']),
      'mast-out-ashore': inOre(visits['mast-out-ashore']),
    },
    replacements: {
      strand: priced(replacements.strand),
      rod: priced(replacements.rod),
      fibre: priced(replacements.fibre),
    },
    inspection: inOre(inspection),
    closures: [{ fromOn, untilOn: addMonths(fromOn, 1), reason: 'the crane is overhauled' }],
  };
}

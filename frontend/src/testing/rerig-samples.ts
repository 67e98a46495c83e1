import type { RerigPlanDto, RerigScheduleDto } from '@stayledger/shared/contracts/rerig-schedules';
import { sampleId } from './samples';

/** One visit with the mast out: forestay at its date, cap shrouds taken along. All figures invented. */
export function samplePlan(overrides: Partial<RerigPlanDto> = {}): RerigPlanDto {
  const task = (taskId: string, name: string, dueOn: string) => ({
    taskId,
    name,
    partIds: [sampleId(30)],
    action: 'replace' as const,
    ground: 'replace-by' as const,
    dueOn,
    doneOn: '2028-12-10',
    lateDays: 0,
    nextDueOn: null,
    orderByOn: '2028-08-06',
    orderNow: false,
    costMinor: 43_200,
    contingencyMinor: 8_640,
    hours: 4,
  });
  const otherwise = { windowId: '2029-spring', costMinor: 240_000, visits: 1, mastOutVisits: 1, lateDays: 0 };
  return {
    id: sampleId(50),
    number: 2,
    madeAt: '2027-01-05T10:00:00.000Z',
    askedByName: 'Ailsa Renwick',
    change: null,
    canUndo: true,
    plan: {
      asOfOn: '2027-01-05',
      horizonEndOn: '2039-01-05',
      currency: 'EUR',
      visits: [
        {
          windowId: '2028-autumn',
          kind: 'mast-out-ashore',
          startOn: '2028-10-01',
          doneByOn: '2028-12-10',
          locked: false,
          visitCostMinor: 140_000,
          visitContingencyMinor: 28_000,
          tasks: [
            task('replace:forestay', 'Forestay', '2029-02-01'),
            task('replace:caps', 'Cap shroud, both sides', '2029-09-01'),
          ],
          hours: 20,
          totalMinor: 271_680,
        },
      ],
      totalMinor: 271_680,
      hours: 20,
      lateDays: 0,
      lateTasks: [],
      withoutDate: ['Backstay'],
      proof: { ended: 'proven', boundMinor: 271_680, gap: 0 },
      remarks: [],
    },
    explanations: [
      {
        taskId: 'replace:forestay',
        name: 'Forestay',
        windowId: '2028-autumn',
        dueOn: '2029-02-01',
        because: 'cannot-wait',
        sharedWith: [],
        waiting: { ...otherwise, lateDays: 28 },
        earlier: null,
      },
      {
        taskId: 'replace:caps',
        name: 'Cap shroud, both sides',
        windowId: '2028-autumn',
        dueOn: '2029-09-01',
        because: 'shares-visit',
        sharedWith: [{ taskId: 'replace:forestay', name: 'Forestay' }],
        waiting: otherwise,
        earlier: null,
      },
    ],
    alternatives: (['least-cost', 'fewest-visits', 'latest-allowed'] as const).map((preference) => ({
      preference,
      totalMinor: 271_680,
      visits: 1,
      mastOutVisits: 1,
      lateDays: 0,
      startsOn: ['2028-10-01'],
    })),
    diff: {
      isSame: false,
      costMinor: -50_000,
      visitCount: -1,
      lateDays: 0,
      tasksMoved: [{ name: 'Forestay', occurrence: 0, fromOn: '2028-05-15', toOn: '2028-12-10' }],
      causes: ['Forestay: its date moved from 2028-06-01 to 2029-02-01.'],
    },
    windows: [
      { id: '2028-autumn', label: 'Autumn 2028', opensOn: '2028-10-01', closesOn: '2028-12-10' },
      { id: '2029-spring', label: 'Spring 2029', opensOn: '2029-03-01', closesOn: '2029-05-15' },
    ],
    notes: [],
    ...overrides,
  };
}

export function sampleSchedule(overrides: Partial<RerigScheduleDto> = {}): RerigScheduleDto {
  return {
    vesselId: sampleId(10),
    todayOn: '2027-01-05',
    firmName: 'Skerry Rigging',
    horizonYears: 12,
    absences: [],
    state: 'draft',
    question: null,
    version: 4,
    planning: null,
    plan: samplePlan(),
    draftHidden: false,
    datesMoved: false,
    ...overrides,
  };
}

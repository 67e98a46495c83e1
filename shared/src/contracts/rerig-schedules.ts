import { z } from 'zod';
import { jobSchema } from './jobs.js';
import { daySchema, idSchema, instantSchema, versionSchema } from './values.js';
import { daySpanSchema, VISIT_KINDS } from './yard-terms.js';

/** A plan is drawn up, shown to the owner, accepted, booked at the yard, done. A new plan is a draft again. */
export const SCHEDULE_STATES = ['draft', 'proposed', 'accepted', 'booked', 'done'] as const;
export type ScheduleState = (typeof SCHEDULE_STATES)[number];
export const PLAN_PREFERENCES = ['least-cost', 'fewest-visits', 'latest-allowed'] as const;

const visitKindSchema = z.enum(VISIT_KINDS);
const windowIdSchema = z.string().min(1).max(60);
const taskIdSchema = z.string().min(1).max(4000);
const moneySchema = z.int();

/** What a person does to a plan by hand. */
export const planChangeSchema = z.discriminatedUnion('change', [
  z.strictObject({ change: z.enum(['lock', 'unlock', 'drop']), windowId: windowIdSchema }),
  z
    .strictObject({ change: z.literal('move'), fromWindowId: windowIdSchema, toWindowId: windowIdSchema })
    .refine(({ fromWindowId, toWindowId }) => fromWindowId !== toWindowId, {
      message: 'The visit is in that window already.',
      path: ['toWindowId'],
    }),
  z
    .strictObject({
      change: z.literal('split'),
      fromWindowId: windowIdSchema,
      toWindowId: windowIdSchema,
      taskIds: z.array(taskIdSchema).min(1, 'Choose the work to be done apart.').max(60),
    })
    .refine(({ fromWindowId, toWindowId }) => fromWindowId !== toWindowId, {
      message: 'The work is in that window already.',
      path: ['toWindowId'],
    }),
]);
export type PlanChangeInput = z.infer<typeof planChangeSchema>;

/** Plans anew from the register as it stands; with a change, from the plan that stands. */
export const requestPlanSchema = z.strictObject({
  version: versionSchema.optional(),
  change: planChangeSchema.nullable().default(null),
});
export type RequestPlanInput = z.input<typeof requestPlanSchema>;

/** How far to plan and when the vessel cannot come. A plan follows at once. */
export const scheduleSettingsSchema = z.strictObject({
  version: versionSchema.optional(),
  horizonYears: z.int().min(1).max(20),
  absences: z.array(daySpanSchema).max(60),
});
export type ScheduleSettingsInput = z.input<typeof scheduleSettingsSchema>;

export const undoPlanSchema = z.strictObject({ version: versionSchema });
export const moveScheduleSchema = z.strictObject({
  version: versionSchema,
  state: z.enum(['draft', 'proposed', 'booked', 'done']),
});
export type MoveScheduleInput = z.infer<typeof moveScheduleSchema>;
/** The owner's answer to a proposed plan. */
export const answerPlanSchema = z
  .strictObject({
    version: versionSchema,
    answer: z.enum(['accept', 'ask']),
    question: z.string().trim().max(2000).default(''),
  })
  .refine(({ answer, question }) => answer === 'accept' || question !== '', {
    message: 'Write what you want to know.',
    path: ['question'],
  });
export type AnswerPlanInput = z.input<typeof answerPlanSchema>;

const plannedTaskSchema = z.object({
  taskId: z.string(),
  name: z.string(),
  partIds: z.array(z.string()),
  action: z.enum(['replace', 'inspect']),
  ground: z.enum(['replace-by', 'inspection-interval', 'provisional-date', 'suspended-date']),
  dueOn: daySchema.nullable(),
  doneOn: daySchema,
  lateDays: z.int(),
  nextDueOn: daySchema.nullable(),
  orderByOn: daySchema.nullable(),
  orderNow: z.boolean(),
  costMinor: moneySchema,
  contingencyMinor: moneySchema,
  hours: z.number(),
});
const plannedVisitSchema = z.object({
  windowId: z.string(),
  kind: visitKindSchema,
  startOn: daySchema,
  doneByOn: daySchema,
  locked: z.boolean(),
  visitCostMinor: moneySchema,
  visitContingencyMinor: moneySchema,
  tasks: z.array(plannedTaskSchema),
  hours: z.number(),
  totalMinor: moneySchema,
});
export const vesselPlanSchema = z.object({
  asOfOn: daySchema,
  horizonEndOn: daySchema,
  currency: z.string(),
  visits: z.array(plannedVisitSchema),
  totalMinor: moneySchema,
  hours: z.number(),
  lateDays: z.int(),
  lateTasks: z.array(
    z.object({
      taskId: z.string(),
      name: z.string(),
      dueOn: daySchema,
      doneOn: daySchema.nullable(),
      lateDays: z.int(),
      reason: z.enum([
        'overdue-already',
        'no-window-in-time',
        'windows-too-far-apart',
        'nothing-allows-it',
        'settled-by-hand',
        'gives-way',
      ]),
      words: z.string(),
    }),
  ),
  withoutDate: z.array(z.string()),
  proof: z.object({ ended: z.enum(['proven', 'time-limit']), boundMinor: moneySchema, gap: z.number() }),
  remarks: z.array(z.string()),
});
export type VesselPlanDto = z.infer<typeof vesselPlanSchema>;
export type PlannedVisitDto = VesselPlanDto['visits'][number];

const otherwiseSchema = z.object({
  windowId: z.string().nullable(),
  costMinor: moneySchema,
  visits: z.int(),
  mastOutVisits: z.int(),
  lateDays: z.int(),
});
/** Why a task falls where it does, and what another place would cost. */
export const taskExplanationSchema = z.object({
  taskId: z.string(),
  name: z.string(),
  windowId: z.string(),
  dueOn: daySchema.nullable(),
  because: z.enum(['settled', 'late', 'cannot-wait', 'shares-visit', 'cheapest', 'free-choice']),
  sharedWith: z.array(z.object({ taskId: z.string(), name: z.string() })),
  waiting: otherwiseSchema,
  earlier: otherwiseSchema.nullable(),
});
export type TaskExplanationDto = z.infer<typeof taskExplanationSchema>;

/** What is different from the plan before. Money and counts are after less before. */
export const planDiffSchema = z.object({
  isSame: z.boolean(),
  costMinor: moneySchema,
  visitCount: z.int(),
  lateDays: z.int(),
  tasksMoved: z.array(
    z.object({
      name: z.string(),
      occurrence: z.int(),
      fromOn: daySchema.nullable(),
      toOn: daySchema.nullable(),
    }),
  ),
  /** What of the basis moved, one sentence each. */
  causes: z.array(z.string()),
});
export type PlanDiffDto = z.infer<typeof planDiffSchema>;

/** A plan as it was made; never changed. */
export const rerigPlanSchema = z.object({
  id: idSchema,
  number: z.int(),
  madeAt: instantSchema,
  askedByName: z.string(),
  change: planChangeSchema.nullable(),
  /** True where an earlier plan can be gone back to. */
  canUndo: z.boolean(),
  plan: vesselPlanSchema,
  /** Empty where the solver had no time to compare. */
  explanations: z.array(taskExplanationSchema),
  alternatives: z.array(
    z.object({
      preference: z.enum(PLAN_PREFERENCES),
      totalMinor: moneySchema,
      visits: z.int(),
      mastOutVisits: z.int(),
      lateDays: z.int(),
      startsOn: z.array(daySchema),
    }),
  ),
  diff: planDiffSchema.nullable(),
  windows: z.array(
    z.object({
      id: z.string(),
      label: z.string(),
      opensOn: daySchema,
      closesOn: daySchema,
    }),
  ),
  notes: z.array(z.string()),
});
export type RerigPlanDto = z.infer<typeof rerigPlanSchema>;

export const rerigScheduleSchema = z.object({
  vesselId: idSchema,
  /** Day in the vessel's zone. */
  todayOn: daySchema,
  firmName: z.string(),
  horizonYears: z.int(),
  absences: z.array(z.object({ fromOn: daySchema, untilOn: daySchema, reason: z.string() })),
  state: z.enum(SCHEDULE_STATES),
  /** What the owner asked about the plan that stands. */
  question: z.string().nullable(),
  /** Null until anything was planned or set. */
  version: versionSchema.nullable(),
  /** The latest planning, where its plan does not stand yet: running, or failed. */
  planning: jobSchema.nullable(),
  /** Null where nothing was planned, or where a draft is not to be seen. */
  plan: rerigPlanSchema.nullable(),
  /** True where there is a draft that the person may not see yet. */
  draftHidden: z.boolean(),
  /** True where the dates of a part were worked out again after the plan was made: it may no longer keep them. */
  datesMoved: z.boolean(),
});
export type RerigScheduleDto = z.infer<typeof rerigScheduleSchema>;

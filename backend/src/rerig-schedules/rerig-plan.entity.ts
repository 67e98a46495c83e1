import { Entity, Index } from '@mikro-orm/core';
import type { PlanDiff } from '@stayledger/shared/rerig-schedule/diff-plans';
import type { TaskExplanation } from '@stayledger/shared/rerig-schedule/explain-plan';
import type { PlanInput } from '@stayledger/shared/rerig-schedule/plan-input';
import type { PlanPreference } from '@stayledger/shared/rerig-schedule/plan-vessel';
import type { VesselPlan } from '@stayledger/shared/rerig-schedule/vessel-plan';
import { InstantColumn, JsonColumn, References } from '../database/columns.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { RerigRequest } from './rerig-request.entity.js';

/** A plan as the solver gave it, with all it followed from. Written once by the worker, never changed. */
@Entity({ tableName: 'rerig_plan' })
export class RerigPlan {
  /** The id of the request it answers. */
  @References(() => RerigRequest, { primary: true, fieldName: 'id' })
  id!: string;

  @Index({ name: 'rerig_plan_vessel' })
  @References(() => Vessel)
  vessel!: string;

  @JsonColumn()
  input!: PlanInput;

  @JsonColumn()
  plan!: VesselPlan;

  @JsonColumn()
  alternatives!: Record<PlanPreference, VesselPlan>;

  @JsonColumn()
  explanations!: TaskExplanation[];

  /** What is different from the plan that stood before. */
  @JsonColumn({ nullable: true })
  diff: PlanDiff | null = null;

  @JsonColumn()
  windowLabels!: { id: string; label: string }[];

  @JsonColumn()
  notes!: string[];

  @InstantColumn()
  createdAt!: Date;
}

import { Entity, Unique } from '@mikro-orm/core';
import { SCHEDULE_STATES, type ScheduleState } from '@stayledger/shared/contracts/rerig-schedules';
import { ChoiceColumn, IntegerColumn, JsonColumn, References, TextColumn } from '../database/columns.js';
import { EditableRow } from '../database/row.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { RerigPlan } from './rerig-plan.entity.js';
import { RerigRequest } from './rerig-request.entity.js';

/** Which plan of a vessel stands, how far it has come, and what it has to keep clear of. */
@Entity({ tableName: 'rerig_schedule' })
export class RerigSchedule extends EditableRow {
  @Unique({ name: 'rerig_schedule_vessel' })
  @References(() => Vessel)
  vessel!: string;

  @ChoiceColumn(SCHEDULE_STATES)
  state!: ScheduleState;

  @IntegerColumn({ default: 12 })
  horizonYears = 12;

  @JsonColumn()
  absences!: { fromOn: string; untilOn: string; reason: string }[];

  @References(() => RerigPlan, { nullable: true, fieldName: 'plan_id' })
  plan: string | null = null;

  /** The latest request; its plan stands once it is made. */
  @References(() => RerigRequest, { nullable: true, fieldName: 'request_id' })
  request: string | null = null;

  /** What the owner asked about the plan that stands. */
  @TextColumn({ nullable: true })
  question: string | null = null;
}

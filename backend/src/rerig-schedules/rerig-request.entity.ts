import { Entity, PrimaryKey, Unique } from '@mikro-orm/core';
import type { PlanChange } from '@stayledger/shared/rerig-schedule/change-plan';
import { InstantColumn, IntegerColumn, JsonColumn, References, UuidColumn } from '../database/columns.js';
import { User } from '../users/user.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';

/** Somebody asked for a plan. The subject of a job; the plan made from it carries the same id. Never changed. */
@Entity({ tableName: 'rerig_request' })
@Unique({ name: 'rerig_request_number', properties: ['vessel', 'number'] })
export class RerigRequest {
  @PrimaryKey({ type: 'uuid', columnType: 'uuid' })
  id!: string;

  @References(() => Vessel)
  vessel!: string;

  /** Counts the requests of the vessel from 1. */
  @IntegerColumn()
  number!: number;

  /** The plan that stood when this was asked; its decisions carry over. */
  @UuidColumn({ nullable: true })
  basePlanId: string | null = null;

  @JsonColumn({ nullable: true })
  change: PlanChange | null = null;

  /** Seasons in which the yard had no room left for another vessel. */
  @JsonColumn()
  fullSeasonIds!: string[];

  @References(() => User, { fieldName: 'asked_by' })
  askedBy!: string;

  @InstantColumn()
  createdAt!: Date;
}

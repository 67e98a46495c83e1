import { Entity, Property } from '@mikro-orm/core';
import { DayColumn, InstantColumn, IntegerColumn, NumberColumn, References } from '../database/columns.js';
import { Vessel } from './vessel.entity.js';

/**
 * What lists show of a vessel, one narrow row each. Kept by triggers of the database on standings, fitted parts and
 * logs (see the migration); the application only reads it.
 */
@Entity({ tableName: 'vessel_standing' })
export class VesselStanding {
  @References(() => Vessel, { primary: true })
  vessel!: string;

  /** Fitted now. */
  @IntegerColumn({ default: 0 })
  parts = 0;

  @IntegerColumn({ default: 0 })
  assessed = 0;

  @IntegerColumn({ default: 0 })
  notAssessed = 0;

  @IntegerColumn({ default: 0 })
  calendarOnly = 0;

  /** Parts with their allowance used up: overdue on any day. */
  @IntegerColumn({ default: 0 })
  usedUp = 0;

  @DayColumn({ nullable: true })
  firstDueOn: string | null = null;

  /** Replace-by dates of the other parts, earliest first. */
  @Property<object>({ type: 'array', columnType: 'date[]', defaultRaw: `'{}'` })
  replaceByDates: string[] = [];

  @IntegerColumn({ default: 0 })
  logsWaiting = 0;

  @NumberColumn({ default: 0 })
  loggedHours = 0;

  @InstantColumn({ nullable: true })
  lastLogAt: Date | null = null;
}

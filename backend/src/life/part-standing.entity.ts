import { Entity, Index } from '@mikro-orm/core';
import { ASSESSMENTS, type PartStandingDto } from '@stayledger/shared/contracts/rig';
import type { PartStanding as ComputedStanding } from '@stayledger/shared/fatigue/life/governing-rule';
import {
  ChoiceColumn,
  DayColumn,
  InstantColumn,
  JsonColumn,
  NumberColumn,
  References,
  TextColumn,
} from '../database/columns.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';

/**
 * Where a fitted part stands, one row per part, rewritten in the transaction that changes its account, its
 * description or the usage plan. Feeds every list, so that none has to add up ledgers.
 */
@Entity({ tableName: 'part_standing' })
export class PartStanding {
  @References(() => FittedPart, { primary: true })
  fittedPart!: string;

  @Index({ name: 'part_standing_vessel' })
  @References(() => Vessel)
  vessel!: string;

  @ChoiceColumn(ASSESSMENTS)
  assessment!: PartStandingDto['assessment'];

  @TextColumn({ nullable: true })
  notAssessedReason: string | null = null;

  @TextColumn()
  loadBasis!: PartStandingDto['loadBasis'];

  /** Design damage of the governing detail. */
  @NumberColumn({ nullable: true })
  damage: number | null = null;

  @NumberColumn({ nullable: true })
  designFatigueFactor: number | null = null;

  @NumberColumn({ nullable: true })
  allowanceUsed: number | null = null;

  @TextColumn({ nullable: true })
  governingDetail: string | null = null;

  @NumberColumn({ default: 0 })
  loggedHours = 0;

  @DayColumn({ nullable: true })
  fatigueReplaceByOn: string | null = null;

  @DayColumn({ nullable: true })
  calendarReplaceByOn: string | null = null;

  @DayColumn({ nullable: true })
  replaceByOn: string | null = null;

  @TextColumn({ nullable: true })
  governingRule: PartStandingDto['governingRule'] = null;

  @NumberColumn({ nullable: true })
  remainingYears: number | null = null;

  /** The whole result as the engine gave it on `computedOn`. */
  @JsonColumn()
  standing!: ComputedStanding;

  @DayColumn()
  computedOn!: string;

  @InstantColumn()
  updatedAt!: Date;
}

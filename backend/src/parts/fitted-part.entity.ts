import { Entity, Index } from '@mikro-orm/core';
import type { PartHardware, TERMINALS } from '@stayledger/shared/contracts/parts';
import { Construction } from '../constructions/construction.entity.js';
import {
  ChoiceColumn,
  DayColumn,
  JsonColumn,
  NumberColumn,
  References,
  ReferencesVersion,
  TextColumn,
} from '../database/columns.js';
import { EditableRow } from '../database/row.js';
import { Position } from '../rig/position.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';

export const BREAKING_LOAD_SOURCES = ['certificate', 'table', 'table-lower-grade'] as const;
type Terminal = (typeof TERMINALS)[number];

/** The actual assembly in a position between two days. The fatigue account belongs to it. */
@Entity({ tableName: 'fitted_part' })
@Index({
  name: 'fitted_part_current',
  expression: 'create unique index fitted_part_current on fitted_part (position_id) where removed_on is null',
})
export class FittedPart extends EditableRow {
  @Index({ name: 'fitted_part_vessel' })
  @References(() => Vessel)
  vessel!: string;

  @References(() => Position)
  position!: string;

  /** `[id, version]` */
  @ReferencesVersion(() => Construction, ['construction_id', 'construction_version'])
  construction!: [string, number];

  @NumberColumn()
  diameterMm!: number;

  /** Of the wire, rod or rope alone; the assembly may be weaker. */
  @NumberColumn()
  breakingLoadKn!: number;

  @ChoiceColumn(BREAKING_LOAD_SOURCES)
  breakingLoadSource!: (typeof BREAKING_LOAD_SOURCES)[number];

  @NumberColumn({ fieldName: 'metallic_area_mm2' })
  metallicAreaMm2!: number;

  @NumberColumn({ nullable: true })
  lengthM: number | null = null;

  @TextColumn()
  upperTerminal!: Terminal;

  @TextColumn()
  lowerTerminal!: Terminal;

  @TextColumn({ nullable: true })
  threadSize: string | null = null;

  @NumberColumn({ nullable: true })
  pinDiameterMm: number | null = null;

  /** Null: nobody described it. */
  @JsonColumn({ nullable: true })
  hardware: PartHardware | null = null;

  @TextColumn({ default: '' })
  batch = '';

  @TextColumn({ default: '' })
  certificate = '';

  /** Null: not known. The calendar then runs from the vessel's build year. */
  @DayColumn({ nullable: true })
  fittedOn: string | null = null;

  @DayColumn({ nullable: true })
  removedOn: string | null = null;

  @TextColumn({ nullable: true })
  removedReason: string | null = null;

  @TextColumn({ default: '' })
  notes = '';
}

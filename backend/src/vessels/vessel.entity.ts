import { Entity } from '@mikro-orm/core';
import type { RIG_TYPES, USE_KINDS } from '@stayledger/shared/contracts/vessels';
import { InstantColumn, IntegerColumn, NumberColumn, References, TextColumn } from '../database/columns.js';
import { EditableRow } from '../database/row.js';
import { Firm } from '../firms/firm.entity.js';

@Entity({ tableName: 'vessel' })
export class Vessel extends EditableRow {
  /** The firm that looks after her. */
  @References(() => Firm)
  firm!: string;

  @TextColumn()
  name!: string;

  @TextColumn()
  rigType!: (typeof RIG_TYPES)[number];

  /** IANA name. Days of her logs and dates are days in this zone. */
  @TextColumn()
  zone!: string;

  @IntegerColumn({ nullable: true })
  buildYear: number | null = null;

  @NumberColumn({ nullable: true })
  lengthM: number | null = null;

  @TextColumn({ nullable: true })
  homePort: string | null = null;

  @TextColumn({ default: 'private' })
  useKind: (typeof USE_KINDS)[number] = 'private';

  @TextColumn({ default: '' })
  notes = '';

  @InstantColumn({ nullable: true })
  archivedAt: Date | null = null;
}

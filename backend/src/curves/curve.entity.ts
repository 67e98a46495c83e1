import { Entity, Index, PrimaryKey, PrimaryKeyProp } from '@mikro-orm/core';
import { InstantColumn, JsonColumn, References, TextColumn } from '../database/columns.js';
import { Firm } from '../firms/firm.entity.js';

/** A curve of the reference data. Rows are never changed: a correction is a new version. */
@Entity({ tableName: 'curve' })
@Index({
  name: 'curve_firm',
  expression: 'create index curve_firm on curve (firm_id) where firm_id is not null',
})
export class Curve {
  [PrimaryKeyProp]?: ['id', 'version'];

  @PrimaryKey({ type: 'text', columnType: 'text' })
  id!: string;

  @PrimaryKey({ type: 'integer', columnType: 'int' })
  version!: number;

  /** Null: part of the product. Otherwise a firm's own addition. */
  @References(() => Firm, { nullable: true })
  firm: string | null = null;

  @TextColumn()
  name!: string;

  @JsonColumn()
  data!: unknown;

  /** SHA-256 of the canonical JSON of `data`. */
  @TextColumn()
  dataHash!: string;

  @InstantColumn()
  createdAt!: Date;
}

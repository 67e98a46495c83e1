import { Entity, Index, PrimaryKey, PrimaryKeyProp } from '@mikro-orm/core';
import { InstantColumn, JsonColumn, References, TextColumn } from '../database/columns.js';
import { Firm } from '../firms/firm.entity.js';

/** A construction of the reference data. Rows are never changed: a correction is a new version. */
@Entity({ tableName: 'construction' })
@Index({
  name: 'construction_firm',
  expression: 'create index construction_firm on construction (firm_id) where firm_id is not null',
})
export class Construction {
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

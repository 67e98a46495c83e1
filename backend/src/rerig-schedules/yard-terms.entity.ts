import { Entity, Unique } from '@mikro-orm/core';
import type { YardTerms as Terms } from '@stayledger/shared/rerig-schedule/yard-terms';
import { JsonColumn, References } from '../database/columns.js';
import { EditableRow } from '../database/row.js';
import { Firm } from '../firms/firm.entity.js';
import { User } from '../users/user.entity.js';

/** What a firm asks for its work and when its yard is open; one row per firm that has stated it. */
@Entity({ tableName: 'yard_terms' })
export class YardTermsRow extends EditableRow {
  @Unique({ name: 'yard_terms_firm' })
  @References(() => Firm)
  firm!: string;

  @JsonColumn()
  terms!: Terms;

  @References(() => User, { fieldName: 'stated_by' })
  statedBy!: string;
}

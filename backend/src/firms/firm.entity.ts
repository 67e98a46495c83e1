import { Check, Entity } from '@mikro-orm/core';
import { FIRM_KINDS } from '@stayledger/shared/contracts/firms';
import { ChoiceColumn, TextColumn } from '../database/columns.js';
import { EditableRow } from '../database/row.js';

@Entity({ tableName: 'firm' })
@Check({ name: 'firm_currency_check', expression: `currency ~ '^[A-Z]{3}$'` })
export class Firm extends EditableRow {
  @TextColumn()
  name!: string;

  @ChoiceColumn(FIRM_KINDS)
  kind!: (typeof FIRM_KINDS)[number];

  /** ISO 4217, the firm's prices are in it. */
  @TextColumn({ default: 'EUR' })
  currency = 'EUR';
}

import { Check, Entity, Unique } from '@mikro-orm/core';
import { NumberColumn, References, TextColumn } from '../database/columns.js';
import { EditableRow } from '../database/row.js';
import { User } from '../users/user.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';

/** How much the vessel is going to sail, in the words of whoever decides it. */
@Entity({ tableName: 'usage_plan' })
@Check({
  name: 'usage_plan_sailing_hours_per_year_check',
  expression:
    '(sailing_hours_per_year >= (0)::double precision) and (sailing_hours_per_year <= (8784)::double precision)',
})
export class UsagePlan extends EditableRow {
  @Unique({ name: 'usage_plan_vessel' })
  @References(() => Vessel)
  vessel!: string;

  @NumberColumn()
  sailingHoursPerYear!: number;

  @TextColumn({ default: '' })
  note = '';

  @References(() => User, { fieldName: 'stated_by' })
  statedBy!: string;
}

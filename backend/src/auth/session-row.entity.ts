import { Entity, Index, PrimaryKey, Property } from '@mikro-orm/core';

/** The table of the session store. The store writes it; the entity keeps the schema comparison complete. */
@Entity({ tableName: 'session' })
export class SessionRow {
  @PrimaryKey({ type: 'string', columnType: 'varchar' })
  sid!: string;

  @Property({ type: 'json', columnType: 'json' })
  sess!: object;

  @Index({ name: 'session_expire' })
  @Property({ type: 'datetime', columnType: 'timestamp(6)' })
  expire!: Date;
}

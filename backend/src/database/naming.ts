import { UnderscoreNamingStrategy } from '@mikro-orm/core';

/** Names constraints the way PostgreSQL does by itself, so that plain SQL migrations need not spell them out. */
export class PostgresNaming extends UnderscoreNamingStrategy {
  override indexName(
    tableName: string,
    columns: string[],
    type: 'primary' | 'foreign' | 'unique' | 'index' | 'sequence' | 'check',
  ): string {
    if (type === 'foreign') return `${tableName}_${columns.join('_')}_fkey`.slice(0, 63);
    return super.indexName(tableName, columns, type);
  }
}

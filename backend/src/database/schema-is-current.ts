import { MikroORM } from '@mikro-orm/postgresql';
import { Injectable, type OnModuleInit } from '@nestjs/common';
import { MIGRATION_TABLE } from './mikro-orm.config.js';
import { MIGRATIONS } from './migrations.js';

/** Refuses to start on a database that is older or newer than the program. Migrating is a step of its own. */
@Injectable()
export class SchemaIsCurrent implements OnModuleInit {
  constructor(private readonly orm: MikroORM) {}

  async onModuleInit(): Promise<void> {
    const rows = await this.orm.em
      .getConnection()
      .execute<{ name: string }[]>(`select name from ${MIGRATION_TABLE}`);
    const done = new Set(rows.map(({ name }) => name));
    const known = MIGRATIONS.map(({ name }) => name);
    const missing = known.filter((name) => !done.delete(name));
    if (missing.length > 0) {
      throw new Error(
        `The database lacks ${missing.join(', ')}. Run \`node backend/dist/database/migrate.cli.js\` first.`,
      );
    }
    if (done.size > 0) {
      throw new Error(`The database is newer than this program (it has ${[...done].join(', ')}).`);
    }
  }
}

import { join } from 'node:path';
import { defineConfig, type Options } from '@mikro-orm/postgresql';
import { Migrator } from '@mikro-orm/migrations';
import { ENTITIES } from './entities.js';
import { MIGRATIONS } from './migrations.js';
import { PostgresNaming } from './naming.js';

/** Where the migrator notes what has run. The application may read it, to refuse starting on an older schema. */
export const MIGRATION_TABLE = 'schema_migration';

/**
 * The one ORM configuration. The server and the worker pass the address of the application role, which owns nothing;
 * the migration and seed commands pass the owner's.
 */
export function ormOptions(url: string, options: { poolMax?: number } = {}): Options {
  return defineConfig({
    clientUrl: url,
    entities: ENTITIES,
    namingStrategy: PostgresNaming,
    forceUtcTimezone: true,
    // Contexts are made per request and per job. Using the global one would mix people's data, so it throws.
    allowGlobalContext: false,
    validateRequired: false,
    extensions: [Migrator],
    migrations: {
      migrationsList: MIGRATIONS,
      tableName: MIGRATION_TABLE,
      // Migrations are written by hand and compared with a live database (`npm run db:check`); a snapshot file would
      // be rewritten by every start.
      snapshotName: '.snapshot-stayledger',
      snapshot: false,
      path: join(__dirname, 'migrations'),
      emit: 'ts',
      silent: true,
    },
    // Nest's logger says what matters; the ORM's own lines would bypass it.
    debug: false,
    pool: { min: 0, max: options.poolMax ?? 10 },
    driverOptions: {
      // A database that is away should be said within seconds, not after knex's minute.
      acquireConnectionTimeout: 5_000,
      connection: { application_name: 'stayledger' },
    },
  });
}

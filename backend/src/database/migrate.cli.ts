import 'reflect-metadata';
import { readOwnerEnv } from '../config/env.js';
import { asOwner, endWith } from './owner-command.js';

/** `node backend/dist/database/migrate.cli.js`: brings the schema up to date, all migrations in one transaction. */
async function migrate(): Promise<string> {
  const { DATABASE_OWNER_URL } = readOwnerEnv();
  return asOwner(DATABASE_OWNER_URL, async (orm) => {
    const done = await orm.getMigrator().up();
    return done.length === 0
      ? 'the schema is up to date'
      : `applied ${done.map(({ name }) => name).join(', ')}`;
  });
}

endWith(migrate());

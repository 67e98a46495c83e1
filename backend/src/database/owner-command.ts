import { MikroORM } from '@mikro-orm/postgresql';
import { Client } from 'pg';
import { ormOptions } from './mikro-orm.config.js';

/** Any number, the same for all commands of the owner: one at a time, also when two services start at once. */
const OWNER_LOCK = 7_302_029;

/** Runs a command with the owner's rights, alone. */
export async function asOwner<T>(ownerUrl: string, work: (orm: MikroORM) => Promise<T>): Promise<T> {
  const lock = new Client({ connectionString: ownerUrl, application_name: 'stayledger owner command' });
  await lock.connect();
  try {
    await lock.query('select pg_advisory_lock($1)', [OWNER_LOCK]);
    const orm = await MikroORM.init(ormOptions(ownerUrl, { poolMax: 2 }));
    try {
      return await work(orm);
    } finally {
      await orm.close(true);
    }
  } finally {
    await lock.end();
  }
}

/** Ends the process as commands should: one line for people when we know what is wrong, the whole error otherwise. */
export function endWith(command: Promise<string>): void {
  command.then(
    (line) => console.log(line),
    (error: unknown) => {
      const known =
        error instanceof Error && ['EnvironmentError', 'ReferenceChangedError'].includes(error.name);
      console.error(known ? error.message : error);
      process.exitCode = 1;
    },
  );
}

import 'reflect-metadata';
import { Clock } from '../common/clock/clock.js';
import { readOwnerEnv } from '../config/env.js';
import { asOwner, endWith } from './owner-command.js';
import { seedDemo } from './seed/demo.js';
import { seedReferenceData } from './seed/reference-data.js';

/**
 * `node backend/dist/database/seed.cli.js --reference` adds new curves and constructions (every start);
 * `--demo` makes the demo's people and vessels, once, where STAYLEDGER_DEMO is 1 and nobody is registered.
 */
async function seed(what: string | undefined): Promise<string> {
  const env = readOwnerEnv();
  const clock = new Clock();
  if (what === '--reference') {
    return asOwner(env.DATABASE_OWNER_URL, async (orm) => {
      const { added } = await seedReferenceData(orm.em.fork(), clock.now());
      return added === 0 ? 'reference data are up to date' : `added ${added} curves and constructions`;
    });
  }
  if (what === '--demo') {
    if (!env.STAYLEDGER_DEMO) return 'no demo asked for';
    return asOwner(env.DATABASE_OWNER_URL, async (orm) => {
      const made = await seedDemo(orm.em.fork(), clock);
      return made
        ? `made the demo (${made.vessels} vessels, ${made.users} people)`
        : 'somebody is registered already, no demo made';
    });
  }
  throw new Error('Say what to seed: --reference or --demo.');
}

endWith(seed(process.argv[2]));

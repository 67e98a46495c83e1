import { randomBytes } from 'node:crypto';
import { Client } from 'pg';
import { SeededRandom } from '../demo/seeded-random.js';
import { OwnCluster } from '../testing/kills/own-cluster.js';
import { pause, ServiceProcess } from '../testing/kills/service-process.js';
import { killsWanted, tellFigures } from '../testing/kills/soak.js';

const { kills, seed, timeoutMs } = killsWanted({ few: 3 });
jest.setTimeout(timeoutMs);

const OWNER = 'migration_owner';
const PASSWORD = randomBytes(12).toString('hex');

/** Every column, index, policy and grant of a database, and how many rows the reference tables hold. */
const SCHEMA = `
  select 'column' as what, table_name || '.' || column_name || ' ' || data_type || ' ' || is_nullable as text
    from information_schema.columns where table_schema = 'public'
  union all select 'index', indexdef from pg_indexes where schemaname = 'public'
  union all select 'policy', tablename || ' ' || policyname || ' ' || coalesce(qual, '') from pg_policies
  union all select 'grant', table_name || ' ' || grantee || ' ' || privilege_type
    from information_schema.role_table_grants where table_schema = 'public'
  union all select 'migration', name from schema_migration
  union all select 'curve', id || ' ' || version || ' ' || data_hash from curve
  union all select 'construction', id || ' ' || version || ' ' || data_hash from construction
  order by 1, 2`;

describe('a first start that is killed while it makes the schema', () => {
  let cluster: OwnCluster;
  let admin: Client;

  beforeAll(async () => {
    cluster = await OwnCluster.start();
    admin = new Client({ connectionString: cluster.adminUrl });
    await admin.connect();
    await admin.query('create role stayledger_app nologin');
    await admin.query(`create role ${OWNER} login password '${PASSWORD}'`);
  });
  afterAll(async () => {
    await admin?.end();
    await cluster?.end();
  });

  async function emptyDatabase(name: string): Promise<string> {
    await admin.query(`create database ${name} owner ${OWNER}`);
    const url = new URL(cluster.adminUrl);
    url.pathname = `/${name}`;
    url.username = OWNER;
    url.password = PASSWORD;
    return url.href;
  }

  function command(name: 'migrate' | 'seed', url: string): ServiceProcess {
    return ServiceProcess.start(
      name,
      { DATABASE_OWNER_URL: url, DATABASE_APP_URL: url, STAYLEDGER_DATA: '/nonexistent' },
      { args: name === 'seed' ? ['--reference'] : [] },
    );
  }

  async function toItsEnd(process: ServiceProcess): Promise<void> {
    const { code } = await process.ended;
    if (code !== 0) throw new Error(`${process.name} failed: ${process.lastWords}`);
  }

  async function schemaOf(url: string): Promise<string[]> {
    const client = new Client({ connectionString: url });
    await client.connect();
    try {
      const { rows } = await client.query<{ what: string; text: string }>(SCHEMA);
      return rows.map(({ what, text }) => `${what} ${text}`);
    } finally {
      await client.end();
    }
  }

  it('makes the same schema at the next start', async () => {
    const random = new SeededRandom(`migration ${seed}`);
    const peaceful = await emptyDatabase('in_peace');
    const from = performance.now();
    await toItsEnd(command('migrate', peaceful));
    await toItsEnd(command('seed', peaceful));
    const tookMs = performance.now() - from;
    const expected = await schemaOf(peaceful);
    expect(expected.length).toBeGreaterThan(100);

    const killedIn = { migrate: 0, seed: 0, afterwards: 0 };
    for (let i = 0; i < kills; i++) {
      const url = await emptyDatabase(`killed_${i}`);
      const at = performance.now() + random.between(0.1, 1) * tookMs;
      for (const name of ['migrate', 'seed'] as const) {
        const process = command(name, url);
        await Promise.race([process.ended, pause(at - performance.now())]);
        if (!process.running) continue;
        await process.kill();
        killedIn[name] += 1;
        break;
      }
      await toItsEnd(command('migrate', url));
      await toItsEnd(command('seed', url));
      expect(await schemaOf(url)).toEqual(expected);
      await admin.query(`drop database killed_${i} with (force)`);
    }
    killedIn.afterwards = kills - killedIn.migrate - killedIn.seed;
    tellFigures('migration', { kills: killedIn });
    expect(killedIn.migrate + killedIn.seed).toBeGreaterThan(0);
  });
});

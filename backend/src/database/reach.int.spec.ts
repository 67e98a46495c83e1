import { MikroORM } from '@mikro-orm/postgresql';
import { Factories, type TestVessel } from '../testing/factories.js';
import { TestClock } from '../testing/test-clock.js';
import { createTestDatabase, type TestDatabase } from '../testing/test-database.js';
import { ormOptions } from './mikro-orm.config.js';
import { inReach, widenReach, withAccess } from './reach.js';

/** Hold the id of a vessel and nothing else of hers; the services ask for reach before they show one. */
const ONLY_IDS = ['job'];

let database: TestDatabase;
let orm: MikroORM;
let owner: MikroORM;
let make: Factories;
let mine: TestVessel;
let theirs: TestVessel;

beforeAll(async () => {
  database = await createTestDatabase();
  orm = await MikroORM.init(ormOptions(database.appUrl, { poolMax: 4 }));
  owner = await MikroORM.init(ormOptions(database.ownerUrl, { poolMax: 1 }));
  make = new Factories(database.admin, new TestClock());
  mine = await make.vessel();
  theirs = await make.vessel();
  await make.position(mine);
  await make.position(theirs);
});
afterAll(async () => {
  await orm?.close(true);
  await owner?.close(true);
  await database?.drop();
});

const partyOf = (vessel: TestVessel) => `firm:${vessel.firmId}`;

async function vesselTables(): Promise<string[]> {
  const { rows } = await database.admin.query<{ table_name: string }>(
    `select table_name from information_schema.columns
      where table_schema = 'public' and column_name = 'vessel_id' order by table_name`,
  );
  return [...rows.map(({ table_name }) => table_name).filter((name) => !ONLY_IDS.includes(name)), 'vessel'];
}

describe('row level security', () => {
  it('is on, forced, and has a policy for reading and writing on each table with vessel data', async () => {
    const tables = await vesselTables();
    expect(tables.length).toBeGreaterThanOrEqual(13);
    const { rows } = await database.admin.query(
      `select c.relname as name, c.relrowsecurity as enabled, c.relforcerowsecurity as forced,
              bool_and(p.polqual is not null and p.polwithcheck is not null) as both_ways,
              bool_or(pg_get_expr(p.polqual, p.polrelid) like '%reachable_vessels%') as by_reach
         from pg_class c left join pg_policy p on p.polrelid = c.oid and p.polcmd = '*'
        where c.relname = any ($1) and c.relkind = 'r' group by c.oid order by 1`,
      [tables],
    );
    expect(rows).toHaveLength(tables.length);
    for (const row of rows) {
      expect(row).toEqual({ name: row.name, enabled: true, forced: true, both_ways: true, by_reach: true });
    }
  });

  it('shows nothing at all without a setting', async () => {
    for (const table of await vesselTables()) {
      const [{ n }] = await orm.em.fork().execute<{ n: number }[]>(`select count(*)::int as n from ${table}`);
      expect([table, n]).toEqual([table, 0]);
    }
  });

  it('shows raw SQL the rows of the parties and no others', async () => {
    const rows = await inReach(orm.em.fork(), { parties: [partyOf(mine)] }, (em) =>
      em.execute<{ vessel_id: string }[]>('select vessel_id from position'),
    );
    expect(rows).toEqual([{ vessel_id: mine.id }]);
  });

  it('refuses to write for a vessel out of reach', async () => {
    const write = inReach(orm.em.fork(), { parties: [partyOf(mine)] }, (em) =>
      em.execute(`update position set vessel_id = ? where vessel_id = ?`, [theirs.id, mine.id]),
    );
    await expect(write).rejects.toThrow(/row-level security/);
    const insert = inReach(orm.em.fork(), { parties: [partyOf(mine)] }, (em) =>
      em.execute(
        `insert into vessel_access (id, vessel_id, party, role, created_at) values (?, ?, ?, 'rigger', now())`,
        [mine.id, theirs.id, partyOf(mine)],
      ),
    );
    await expect(insert).rejects.toThrow(/row-level security/);
  });

  it('binds the owner of the tables as well', async () => {
    const rows = await owner.em.fork().execute('select id from vessel');
    expect(rows).toEqual([]);
  });

  it('ends a grant at its end', async () => {
    const guest = await make.firm();
    const granted = await make.vessel();
    await make.grant(granted, `firm:${guest.id}`, 'surveyor', { endsAt: new Date('2020-01-01T00:00:00Z') });
    const visible = (firmId: string) =>
      inReach(orm.em.fork(), { parties: [`firm:${firmId}`] }, (em) => em.execute('select id from vessel'));
    expect(await visible(guest.id)).toEqual([]);
    await make.grant(granted, `firm:${guest.id}`, 'surveyor', { endsAt: new Date('2999-01-01T00:00:00Z') });
    expect(await visible(guest.id)).toEqual([{ id: granted.id }]);
  });

  it('takes a made-up party for what it is', async () => {
    for (const party of [
      '',
      'vessel:',
      `vessel:${mine.id}'`,
      '%',
      'firm:%',
      `firm:${mine.firmId.toUpperCase()}`,
    ]) {
      const rows = await inReach(orm.em.fork(), { parties: [party] }, (em) =>
        em.execute('select id from vessel'),
      );
      expect(rows).toEqual([]);
    }
  });

  it('leaks nothing over a shared pool, however transactions interleave', async () => {
    const seen = await Promise.all(
      Array.from({ length: 200 }, async (_, n) => {
        const vessel = n % 2 === 0 ? mine : theirs;
        const rows = await inReach(orm.em.fork(), { parties: [partyOf(vessel)] }, async (em) => {
          await em.execute('select pg_sleep(0.001)');
          return em.execute<{ vessel_id: string }[]>('select vessel_id from position');
        });
        return rows.every(({ vessel_id }) => vessel_id === vessel.id) && rows.length === 1;
      }),
    );
    expect(seen.filter((right) => right)).toHaveLength(200);
    expect(await orm.em.fork().execute('select id from vessel')).toEqual([]);
  });

  it('lets a job see its own vessel and nothing else', async () => {
    const rows = await withAccess(orm.em, { vesselId: theirs.id }, (em) =>
      em.execute('select id from vessel'),
    );
    expect(rows).toEqual([{ id: theirs.id }]);
  });

  it('widens within the transaction only', async () => {
    await inReach(orm.em.fork(), { parties: [partyOf(mine)] }, async (em) => {
      await widenReach(em, theirs.id);
      const rows = await em.execute('select id from vessel order by id');
      expect(rows).toEqual([mine.id, theirs.id].sort().map((id) => ({ id })));
    });
    expect(await orm.em.fork().execute('select id from vessel')).toEqual([]);
  });
});

describe('the application role', () => {
  it('owns nothing and is no exception to any rule', async () => {
    const { rows } = await database.admin.query(
      `select rolsuper or rolbypassrls or rolcreaterole or rolcreatedb as mighty,
              (select count(*)::int from pg_class c where c.relowner = r.oid) as owns
         from pg_roles r where rolname in ('stayledger_app', 'stayledger_test_app')`,
    );
    expect(rows).toEqual([
      { mighty: false, owns: 0 },
      { mighty: false, owns: 0 },
    ]);
  });

  it.each(['ledger_entry', 'audit_event'])('may add to %s, never change or delete', async (table) => {
    const em = orm.em.fork();
    await expect(em.execute(`update ${table} set id = id`)).rejects.toThrow(/permission denied/);
    await expect(em.execute(`delete from ${table}`)).rejects.toThrow(/permission denied/);
    await expect(em.execute(`truncate ${table}`)).rejects.toThrow(/permission denied/);
  });

  it.each(['curve', 'construction'])(
    'changes no reference data and adds only a firm its own (%s)',
    async (table) => {
      await make.reference(table as 'curve' | 'construction', `${table}-of-the-product`, {});
      const em = orm.em.fork();
      await expect(em.execute(`update ${table} set name = 'x'`)).rejects.toThrow(/permission denied/);
      await expect(em.execute(`delete from ${table}`)).rejects.toThrow(/permission denied/);
      const add = (id: string, firmId: string | null) =>
        inReach(orm.em.fork(), { parties: [partyOf(mine)] }, (inner) =>
          inner.execute(
            `insert into ${table} (id, version, firm_id, name, data, data_hash, created_at)
            values (?, 1, ?, 'x', '{}', 'x', now())`,
            [`${table}-${id}`, firmId],
          ),
        );
      await expect(add('as-product', null)).rejects.toThrow(/row-level security/);
      await expect(add('as-others', theirs.firmId)).rejects.toThrow(/row-level security/);
      await add('as-own', mine.firmId);
      const seenBy = async (vessel: TestVessel) =>
        inReach(orm.em.fork(), { parties: [partyOf(vessel)] }, (inner) =>
          inner.execute<{ id: string }[]>(`select id from ${table} where name in ('x', ?) order by id`, [
            `${table}-of-the-product`,
          ]),
        );
      expect(await seenBy(mine)).toEqual([{ id: `${table}-as-own` }, { id: `${table}-of-the-product` }]);
      expect(await seenBy(theirs)).toEqual([{ id: `${table}-of-the-product` }]);
    },
  );

  it('deletes no vessel, part, log or person', async () => {
    for (const table of [
      'vessel',
      'position',
      'fitted_part',
      'part_detail',
      'load_log',
      'app_user',
      'firm',
    ]) {
      await expect(orm.em.fork().execute(`delete from ${table}`)).rejects.toThrow(/permission denied/);
    }
  });

  it("cannot read another person's kept replies", async () => {
    const [ann, bob] = [await make.person(), await make.person()];
    await make.insert('idempotency_key', {
      user_id: ann.id,
      key: ann.id,
      route: '/api/vessels',
      request_hash: 'x',
      status: 201,
      reply: { secret: true },
      created_at: new Date('2027-01-01T00:00:00Z'),
    });
    const keysOf = (userId: string) =>
      inReach(orm.em.fork(), { parties: [`user:${userId}`], userId }, (em) =>
        em.execute('select key from idempotency_key'),
      );
    expect(await keysOf(bob.id)).toEqual([]);
    expect(await keysOf(ann.id)).toEqual([{ key: ann.id }]);
  });
});

import { MikroORM } from '@mikro-orm/postgresql';
import { createTestDatabase, type TestDatabase } from '../../testing/test-database.js';
import { ormOptions } from '../mikro-orm.config.js';
import { addVersion, ReferenceChangedError, seedReferenceData } from './reference-data.js';

let database: TestDatabase;
let orm: MikroORM;
const now = new Date('2027-01-01T00:00:00Z');

beforeAll(async () => {
  database = await createTestDatabase();
  orm = await MikroORM.init(ormOptions(database.ownerUrl));
});
afterAll(async () => {
  await orm?.close(true);
  await database?.drop();
});

describe('seeding reference data', () => {
  it('has filled the template and adds nothing the second time', async () => {
    const { rows } = await database.admin.query('select count(*)::int as count from curve');
    expect(rows[0].count).toBeGreaterThan(50);
    expect(await seedReferenceData(orm.em.fork(), now)).toEqual({ added: 0 });
  });

  it('adds a new version beside the old one', async () => {
    const em = orm.em.fork();
    expect(await addVersion(em, 'curve', { id: 'made-up', version: 1, name: 'One' }, now)).toBe(1);
    expect(await addVersion(em, 'curve', { id: 'made-up', version: 2, name: 'Two' }, now)).toBe(1);
    const { rows } = await database.admin.query(
      `select version, name from curve where id = 'made-up' order by version`,
    );
    expect(rows).toEqual([
      { version: 1, name: 'One' },
      { version: 2, name: 'Two' },
    ]);
  });

  it('takes the same content in another order of keys for the same', async () => {
    const em = orm.em.fork();
    await addVersion(em, 'construction', { id: 'ordered', version: 1, name: 'Strand' }, now);
    expect(await addVersion(em, 'construction', { name: 'Strand', version: 1, id: 'ordered' }, now)).toBe(0);
  });

  it('refuses to change a version that is out', async () => {
    const em = orm.em.fork();
    await addVersion(em, 'curve', { id: 'fixed', version: 1, name: 'Before' }, now);
    await expect(addVersion(em, 'curve', { id: 'fixed', version: 1, name: 'After' }, now)).rejects.toThrow(
      ReferenceChangedError,
    );
  });
});

import { MikroORM } from '@mikro-orm/postgresql';
import { createTestDatabase, type TestDatabase } from '../testing/test-database.js';
import { ormOptions } from './mikro-orm.config.js';

let database: TestDatabase;
let orm: MikroORM;

beforeAll(async () => {
  database = await createTestDatabase();
  orm = await MikroORM.init(ormOptions(database.ownerUrl));
});

afterAll(async () => {
  await orm?.close(true);
  await database?.drop();
});

describe('schema', () => {
  it('is what the entities say', async () => {
    expect(await orm.getSchemaGenerator().getUpdateSchemaSQL({ wrap: false })).toBe('');
  });
});

import { createHash, randomBytes } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { MikroORM } from '@mikro-orm/postgresql';
import { Client, Pool } from 'pg';
import { Clock } from '../common/clock/clock.js';
import { MIGRATIONS } from '../database/migrations.js';
import { ormOptions } from '../database/mikro-orm.config.js';
import { REFERENCE_FILES, seedReferenceData } from '../database/seed/reference-data.js';

/** The role the migrations grant to. Tests log in as a member of it, so that nobody else's password is changed. */
const APP_GROUP = 'stayledger_app';
const OWNER = 'stayledger_test_owner';
const APP = 'stayledger_test_app';
/** Any number, the same in every worker: one of them makes the template while the others wait. */
const TEMPLATE_LOCK = 7_302_031;

/** A database of its own, cloned from a migrated template in some 50 ms. */
export interface TestDatabase {
  name: string;
  /** As the application: row level security binds it. */
  appUrl: string;
  /** As the owner of the tables. */
  ownerUrl: string;
  /** As the superuser, who sees everything: for arranging and for looking behind the curtain. */
  admin: Pool;
  drop(): Promise<void>;
}

function adminUrl(): string {
  const url = process.env.TEST_DATABASE_ADMIN_URL;
  if (url) return url;
  throw new Error(
    'No PostgreSQL for tests. Run `npm test`, or `node backend/setup/dev-cluster.mjs` before single test files.',
  );
}

/** On a throw-away cluster the roles of the tests carry the administrator's password. */
function rolePassword(): string {
  return decodeURIComponent(new URL(adminUrl()).password);
}

function urlOf(database: string, role?: string): string {
  const url = new URL(adminUrl());
  url.pathname = `/${database}`;
  if (role) {
    url.username = role;
    url.password = rolePassword();
  }
  return url.href;
}

/** Named by what is in it, so a changed migration or curve gets a new template and an unchanged one is used again. */
function templateName(): string {
  const hash = createHash('sha256').update(OWNER);
  for (const migration of MIGRATIONS) {
    hash.update(readFileSync(join(__dirname, '../database/migrations', `${migration.name}.ts`)));
  }
  for (const path of Object.values(REFERENCE_FILES)) hash.update(readFileSync(path));
  return `stayledger_template_${hash.digest('hex').slice(0, 12)}`;
}

async function ensureRole(client: Client, role: string, options: string): Promise<void> {
  const { rowCount } = await client.query('select 1 from pg_roles where rolname = $1', [role]);
  if (!rowCount) await client.query(`create role ${role} nosuperuser ${options}`);
}

async function ensureTemplate(client: Client, template: string): Promise<void> {
  await client.query('select pg_advisory_lock($1)', [TEMPLATE_LOCK]);
  try {
    const found = await client.query('select datistemplate from pg_database where datname = $1', [template]);
    if (found.rows[0]?.datistemplate) return;
    // A half-made one, left by a run that was stopped.
    await client.query(`drop database if exists ${template} with (force)`);
    const password = client.escapeLiteral(rolePassword());
    await ensureRole(client, APP_GROUP, 'nologin');
    await ensureRole(client, OWNER, `login password ${password}`);
    await ensureRole(client, APP, `login password ${password} in role ${APP_GROUP}`);
    await client.query(`create database ${template} owner ${OWNER}`);
    const orm = await MikroORM.init(ormOptions(urlOf(template, OWNER)));
    try {
      await orm.getMigrator().up();
      await seedReferenceData(orm.em.fork(), new Clock().now());
    } finally {
      await orm.close(true);
    }
    await client.query(`alter database ${template} is_template true`);
  } finally {
    await client.query('select pg_advisory_unlock($1)', [TEMPLATE_LOCK]);
  }
}

export async function createTestDatabase(): Promise<TestDatabase> {
  const template = templateName();
  const name = `stayledger_test_${randomBytes(6).toString('hex')}`;
  const client = new Client({ connectionString: adminUrl() });
  await client.connect();
  try {
    await ensureTemplate(client, template);
    await client.query(`create database ${name} template ${template} owner ${OWNER}`);
  } finally {
    await client.end();
  }
  const admin = new Pool({ connectionString: urlOf(name), max: 2 });
  // The database is dropped by force, which ends connections that were just being closed.
  admin.on('error', () => undefined);
  return {
    name,
    appUrl: urlOf(name, APP),
    ownerUrl: urlOf(name, OWNER),
    admin,
    async drop() {
      await admin.end();
      const closing = new Client({ connectionString: adminUrl() });
      await closing.connect();
      await closing.query(`drop database if exists ${name} with (force)`);
      await closing.end();
    },
  };
}

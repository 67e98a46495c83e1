import * as fs from 'node:fs';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import {
  APP_ROLE,
  createThrowAwayCluster,
  makeTemporaryFolder,
  newPassword,
  withConnection,
} from './postgres-cluster.mjs';
import { openExistingServer } from './product-database.mjs';

/** DATABASE_URL: a server that is not ours, with more or fewer rights on it. */

let folder;
let cluster;

beforeAll(async () => {
  folder = await makeTemporaryFolder('stayledger-existing-');
  cluster = await createThrowAwayCluster(folder);
});

afterAll(async () => {
  await cluster?.stop();
  fs.rmSync(folder, { recursive: true, force: true });
});

const asAdmin = (...statements) =>
  withConnection(cluster.adminUrl, async (client) => {
    for (const statement of statements) await client.query(statement);
  });

function urlOf(user, password, database = 'harbour') {
  const url = new URL(cluster.adminUrl);
  if (user) Object.assign(url, { username: user, password });
  url.pathname = `/${database}`;
  return url.href;
}

beforeEach(() =>
  asAdmin(
    'drop database if exists harbour with (force)',
    `drop role if exists ${APP_ROLE}`,
    'drop role if exists plain',
    'drop role if exists maker',
    "create role plain login password 'plain'",
    "create role maker login createrole password 'maker'",
  ),
);

const secrets = { appPassword: newPassword() };

async function whoConnects(url) {
  return withConnection(
    url,
    async (client) => (await client.query('select current_user as who')).rows[0].who,
  );
}

describe('an existing server', () => {
  it('gets the role of the application, when that may be made', async () => {
    await asAdmin('create database harbour owner maker');
    const { appUrl, ownerUrl } = await openExistingServer({ databaseUrl: urlOf('maker', 'maker'), secrets });
    expect(await whoConnects(ownerUrl)).toBe('maker');
    expect(await whoConnects(appUrl)).toBe(APP_ROLE);
    await withConnection(cluster.adminUrl, async (client) => {
      const { rows } = await client.query(
        'select rolsuper, rolcreaterole, rolcreatedb, rolbypassrls from pg_roles where rolname = $1',
        [APP_ROLE],
      );
      expect(rows).toEqual([
        { rolsuper: false, rolcreaterole: false, rolcreatedb: false, rolbypassrls: false },
      ]);
    });
    // The second start finds it as the first one left it.
    const again = await openExistingServer({ databaseUrl: urlOf('maker', 'maker'), secrets });
    expect(await whoConnects(again.appUrl)).toBe(APP_ROLE);
  });

  it('is refused with the statement to run, when the role may not be made', async () => {
    await asAdmin('create database harbour owner plain');
    await expect(openExistingServer({ databaseUrl: urlOf('plain', 'plain'), secrets })).rejects.toThrow(
      `create role ${APP_ROLE} login password`,
    );
  });

  it('is used with the role that an administrator made', async () => {
    await asAdmin('create database harbour owner plain', `create role ${APP_ROLE} login password 'given'`);
    const appUrl = urlOf(APP_ROLE, 'given');
    const opened = await openExistingServer({ databaseUrl: urlOf('plain', 'plain'), appUrl, secrets });
    expect(opened.appUrl).toBe(appUrl);
    expect(opened.outcome).toContain('existing PostgreSQL');
  });

  it('keeps the password of a role that somebody else made', async () => {
    await asAdmin('create database harbour owner maker', `create role ${APP_ROLE} login password 'theirs'`);
    await expect(openExistingServer({ databaseUrl: urlOf('maker', 'maker'), secrets })).rejects.toThrow(
      'made for another installation',
    );
    expect(await whoConnects(urlOf(APP_ROLE, 'theirs'))).toBe(APP_ROLE);
  });

  it('must belong to the user that makes the tables', async () => {
    await asAdmin('create database harbour', 'grant connect on database harbour to plain');
    await expect(openExistingServer({ databaseUrl: urlOf('plain', 'plain'), secrets })).rejects.toThrow(
      'does not own the database',
    );
  });

  it('is named by the driver, never with its password, when it does not answer', async () => {
    const problem = await openExistingServer({ databaseUrl: urlOf('plain', 'wrong-secret'), secrets }).catch(
      (e) => e,
    );
    expect(problem.message).toContain('The database of DATABASE_URL cannot be used');
    expect(problem.message).not.toContain('wrong-secret');
  });
});

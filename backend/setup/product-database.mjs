import * as fs from 'node:fs';
import * as path from 'node:path';
import {
  ADMIN_ROLE,
  APP_ROLE,
  DATABASE,
  OWNER_ROLE,
  clusterMajor,
  createCluster,
  databaseUrl,
  ensureDatabase,
  ensureRoles,
  findPostgres,
  livePostmaster,
  serverAccount,
  startCluster,
  withConnection,
} from './postgres-cluster.mjs';
import { anyFreePort, freePortFrom } from './ports.mjs';
import { Problem } from './problem.mjs';

/**
 * The database of an installation: a cluster of our own in the data folder, or one that exists. Both resolve with
 * `{ ownerUrl, appUrl, ended, stop(), pid, outcome }`.
 */

/** Starts the cluster in the data folder, making it at the first start. */
export async function openOwnCluster({ folder, secrets }) {
  const account = serverAccount();
  const directory = path.join(folder, 'postgres');
  const major = clusterMajor(directory);
  const postgres = await findPostgres(major ?? undefined);
  if (!postgres) {
    throw new Problem(
      `The database in ${directory} was made by PostgreSQL ${major}, which is not installed.`,
      `Install the package postgresql-${major}, or move the data folder away to begin anew.`,
    );
  }
  const pid = livePostmaster(directory);
  if (pid) {
    throw new Problem(
      `A PostgreSQL server (process ${pid}) has ${directory} open, and no start of ours left it.`,
      'End it, then start again.',
    );
  }
  if (major === null)
    await createCluster({ postgres, directory, adminPassword: secrets.adminPassword, account });
  const portFile = path.join(folder, 'postgres.port');
  const lastPort = fs.existsSync(portFile) ? Number(fs.readFileSync(portFile, 'utf8')) : 0;
  const port = lastPort ? await freePortFrom(lastPort) : await anyFreePort();
  fs.writeFileSync(portFile, `${port}\n`, { mode: 0o600 });
  const logFile = path.join(folder, 'postgres.log');
  const server = await startCluster({ postgres, directory, account, port, logFile });
  try {
    const adminUrl = databaseUrl({
      role: ADMIN_ROLE,
      password: secrets.adminPassword,
      port,
      database: 'postgres',
    });
    await withConnection(adminUrl, async (client) => {
      await ensureRoles(client, { [OWNER_ROLE]: secrets.ownerPassword, [APP_ROLE]: secrets.appPassword });
      await ensureDatabase(client, DATABASE, OWNER_ROLE);
    });
  } catch (error) {
    await server.stop();
    throw error.code === '28P01'
      ? new Problem(
          `The passwords in ${path.join(folder, 'secrets.json')} are not those of the database beside it.`,
        )
      : error;
  }
  const url = (role, password) => databaseUrl({ role, password, port, database: DATABASE });
  return {
    ownerUrl: url(OWNER_ROLE, secrets.ownerPassword),
    appUrl: url(APP_ROLE, secrets.appPassword),
    pid: server.pid,
    ended: server.ended,
    stop: server.stop,
    outcome: `PostgreSQL ${postgres.major} on 127.0.0.1:${port}${major === null ? ', newly made' : ''}`,
  };
}

/** The same address with another role in it. */
function withRole(url, role, password) {
  const changed = new URL(url);
  changed.username = role;
  changed.password = encodeURIComponent(password);
  return changed.href;
}

/**
 * Uses the server that DATABASE_URL names. The application must not connect as the owner, since an owner is not bound
 * by row level security unless it is forced: DATABASE_APP_URL names its role, or we make the role if we may.
 */
export async function openExistingServer({ databaseUrl: ownerUrl, appUrl, secrets }) {
  let major;
  try {
    major = await withConnection(ownerUrl, async (client) => {
      const { rows } = await client.query(`
        select current_setting('server_version_num')::int / 10000 as major,
               pg_catalog.pg_get_userbyid(datdba) = current_user as owns,
               (select rolsuper from pg_roles where rolname = current_user) as super
        from pg_database where datname = current_database()`);
      const [{ owns, super: isSuper, ...server }] = rows;
      if (server.major < 15)
        throw new Problem(`DATABASE_URL leads to PostgreSQL ${server.major}; 15 or newer is needed.`);
      if (!owns && !isSuper)
        throw new Problem(
          'The user of DATABASE_URL does not own the database, so it cannot make tables there.',
        );
      if (!appUrl) await ensureAppRole(client, secrets.appPassword);
      return server.major;
    });
  } catch (error) {
    if (error instanceof Problem) throw error;
    // The driver's messages name host, port and user, never the password.
    throw new Problem(`The database of DATABASE_URL cannot be used: ${error.message || error.code}`);
  }
  const finalAppUrl = appUrl || withRole(ownerUrl, APP_ROLE, secrets.appPassword);
  try {
    await withConnection(finalAppUrl, (client) => client.query('select 1'));
  } catch (error) {
    throw new Problem(
      `The application's role cannot connect to the database: ${error.message || error.code}`,
      ...(appUrl
        ? []
        : [
            `If the role ${APP_ROLE} was made for another installation, give its address as DATABASE_APP_URL.`,
          ]),
    );
  }
  return {
    ownerUrl,
    appUrl: finalAppUrl,
    pid: undefined,
    ended: new Promise(() => {}),
    stop: async () => {},
    outcome: `the existing PostgreSQL ${major} at ${new URL(ownerUrl).host}`,
  };
}

/**
 * Makes the application's role. One that is there already is left as it is: roles belong to the whole server, and
 * changing its password could lock another installation out.
 */
async function ensureAppRole(client, password) {
  const { rows } = await client.query('select current_database() as database');
  const database = client.escapeIdentifier(rows[0].database);
  const known = await client.query('select 1 from pg_roles where rolname = $1', [APP_ROLE]);
  try {
    if (!known.rowCount) await ensureRoles(client, { [APP_ROLE]: password });
    await client.query(`grant connect on database ${database} to ${APP_ROLE}`);
  } catch (error) {
    // 42501: insufficient privilege.
    if (error.code !== '42501') throw error;
    throw new Problem(
      `The user of DATABASE_URL may not make the role ${APP_ROLE}. Let an administrator run`,
      `  create role ${APP_ROLE} login password '…'; grant connect on database ${database} to ${APP_ROLE};`,
      'and give its address as DATABASE_APP_URL.',
    );
  }
}

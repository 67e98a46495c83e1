import * as fs from 'node:fs';
import { createServer } from 'node:net';
import * as os from 'node:os';
import * as path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { removeOrphans, sourceFingerprint } from './build.mjs';
import { run, spawnLasting, within } from './child-processes.mjs';
import { chooseDataFolder, lockDataFolder, openDataFolder, readSecrets } from './data-folder.mjs';
import { freePortFrom } from './ports.mjs';
import { serverAccount } from './postgres-cluster.mjs';
import { followServerLog, forTerminal, openServerLog } from './server-log.mjs';

let folder;
beforeEach(() => {
  folder = fs.mkdtempSync(path.join(os.tmpdir(), 'stayledger-steps-'));
});
afterEach(() => fs.rmSync(folder, { recursive: true, force: true }));

function write(file, text = '') {
  const full = path.join(folder, file);
  fs.mkdirSync(path.dirname(full), { recursive: true });
  fs.writeFileSync(full, text);
  return full;
}

describe('build', () => {
  beforeEach(() => {
    for (const file of ['package-lock.json', 'tsconfig.json', 'shared/src/a.ts', 'shared/package.json'])
      write(file, file);
  });

  it('sees a changed, a new and a renamed source, and nothing else', () => {
    const before = sourceFingerprint(folder, ['shared']);
    write('shared/dist/a.js', 'built');
    write('shared/node_modules/x/index.js', 'package');
    write('backend/src/b.ts', 'other workspace');
    expect(sourceFingerprint(folder, ['shared'])).toBe(before);
    write('shared/src/a.ts', 'changed');
    const changed = sourceFingerprint(folder, ['shared']);
    expect(changed).not.toBe(before);
    write('shared/src/a.ts', 'shared/src/a.ts');
    expect(sourceFingerprint(folder, ['shared'])).toBe(before);
    fs.renameSync(path.join(folder, 'shared/src/a.ts'), path.join(folder, 'shared/src/b.ts'));
    expect(sourceFingerprint(folder, ['shared'])).not.toBe(before);
    write('shared/src/a.ts', 'shared/src/a.ts');
    expect(sourceFingerprint(folder, ['shared'])).not.toBe(before);
  });

  it('removes what was built from a source that is gone', () => {
    for (const ending of ['.js', '.js.map', '.d.ts']) {
      write(`shared/dist/a${ending}`);
      write(`shared/dist/deep/gone${ending}`);
    }
    write('shared/dist/data.json');
    const removed = removeOrphans(path.join(folder, 'shared')).map((file) => path.relative(folder, file));
    expect(removed.sort()).toEqual(
      ['d.ts', 'js', 'js.map'].map((ending) => `shared/dist/deep/gone.${ending}`),
    );
    expect(fs.readdirSync(path.join(folder, 'shared/dist')).sort()).toEqual([
      'a.d.ts',
      'a.js',
      'a.js.map',
      'data.json',
      'deep',
    ]);
  });
});

describe('port', () => {
  it('is the wanted one, or the next free one', async () => {
    const server = createServer();
    await new Promise((resolve) => server.listen(0, '127.0.0.1', resolve));
    const { port } = server.address();
    const next = await freePortFrom(port);
    expect(next).toBeGreaterThan(port);
    await new Promise((resolve) => server.close(resolve));
    expect(await freePortFrom(port)).toBe(port);
  });
});

describe('data folder', () => {
  it('is the one that was asked for', async () => {
    const choice = await chooseDataFolder({ root: '/srv/clone', wanted: folder, ownCluster: false });
    expect(choice.folder).toBe(folder);
    expect((await chooseDataFolder({ root: folder, wanted: 'x/y', ownCluster: false })).folder).toBe(
      path.join(folder, 'x/y'),
    );
  });

  it('lies in the clone where the database can get at it, and outside where it cannot', async () => {
    // mkdtemp makes folders that nobody else can enter.
    fs.chmodSync(folder, 0o700);
    const closed = await chooseDataFolder({ root: folder, ownCluster: true });
    if (serverAccount()) {
      expect(closed.folder).toMatch(/^\/var\/lib\/stayledger\/[0-9a-f]{16}$/);
      const other = await chooseDataFolder({
        root: fs.mkdtempSync(path.join(folder, 'b')),
        ownCluster: true,
      });
      expect(other.folder).not.toBe(closed.folder);
      await expect(chooseDataFolder({ root: '/', wanted: folder, ownCluster: true })).rejects.toThrow(
        'cannot enter',
      );
    } else {
      expect(closed.folder).toBe(path.join(folder, '.data'));
    }
    fs.chmodSync(folder, 0o755);
    expect((await chooseDataFolder({ root: folder, ownCluster: true })).folder).toBe(
      path.join(folder, '.data'),
    );
    expect((await chooseDataFolder({ root: folder, ownCluster: false })).folder).toBe(
      path.join(folder, '.data'),
    );
  });

  it('keeps its secrets to itself and does not change them', () => {
    openDataFolder(folder);
    const secrets = readSecrets(folder);
    expect(readSecrets(folder)).toEqual(secrets);
    expect(fs.statSync(path.join(folder, 'secrets.json')).mode & 0o777).toBe(0o600);
    const values = Object.values(secrets);
    expect(new Set(values).size).toBe(values.length);
    for (const value of values) expect(value.length).toBeGreaterThanOrEqual(32);
  });

  it('is used by one starter at a time', async () => {
    const lock = await lockDataFolder(folder);
    await expect(lockDataFolder(folder)).rejects.toThrow(`process ${process.pid}`);
    lock.release();
    (await lockDataFolder(folder)).release();
  });

  it('is free again when the holder was killed, once its children are gone', async () => {
    const child = spawnLasting(['sleep', '60']);
    const { pid } = child.child;
    const startedAt = fs.readFileSync(`/proc/${pid}/stat`, 'utf8').split(') ')[1].split(' ')[19];
    write(
      'start.lock',
      JSON.stringify({ starter: { pid, started: 'before' }, children: [{ pid, started: startedAt }] }),
    );
    const taking = lockDataFolder(folder);
    expect(await within(600, taking)).toBeUndefined();
    child.child.kill('SIGKILL');
    (await taking).release();
  });

  it('is free again when the lock was cut in the middle of writing', async () => {
    write('start.lock', '{"starter":');
    (await lockDataFolder(folder)).release();
  });
});

describe('commands', () => {
  it('tell their outcome, also when they cannot be started', async () => {
    expect(await run(['sh', '-c', 'echo out; echo err >&2; exit 3'])).toEqual({
      code: 3,
      signal: null,
      stdout: 'out\n',
      stderr: 'err\n',
    });
    expect(await run([path.join(folder, 'nothing')])).toMatchObject({ code: 127 });
  });
});

describe('server log', () => {
  it('is followed from where this start begins, line by line, to the last one', () => {
    const file = write('server.log', 'of an earlier start\n');
    const { descriptor, from } = openServerLog(file);
    const lines = [];
    const following = followServerLog(file, from, (line) => lines.push(line));
    fs.writeSync(descriptor, 'first\nsecönd\nunfin');
    fs.writeSync(descriptor, 'ished');
    fs.closeSync(descriptor);
    following.stop();
    expect(lines).toEqual(['first', 'secönd', 'unfinished']);
  });

  it('is put aside when it has grown large', () => {
    const file = write('server.log');
    fs.truncateSync(file, 21 * 1024 * 1024);
    const { descriptor, from } = openServerLog(file);
    fs.closeSync(descriptor);
    expect(from).toBe(0);
    expect(fs.statSync(`${file}.1`).size).toBe(21 * 1024 * 1024);
  });

  it('shows a person what needs one', () => {
    expect(forTerminal('{"level":"log","message":"counted"}')).toBeNull();
    expect(forTerminal('stayledger: ready on http://127.0.0.1:3000')).toBeNull();
    expect(forTerminal('{"level":"warn","message":"disk nearly full","context":"storage"}')).toBe(
      'warn (storage): disk nearly full',
    );
    expect(forTerminal('{"level":"error","message":{"jobId":"1"}}')).toBe('error: {"jobId":"1"}');
    expect(forTerminal('Error: no module')).toBe('Error: no module');
  });
});

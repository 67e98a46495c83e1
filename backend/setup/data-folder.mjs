import { createHash, randomBytes } from 'node:crypto';
import * as fs from 'node:fs';
import * as path from 'node:path';
import { isAlive, pause, run } from './child-processes.mjs';
import { newPassword, serverAccount } from './postgres-cluster.mjs';
import { Problem } from './problem.mjs';

/** The folder that holds all an installation must not lose: database, received files, secrets. */

async function canEnter(account, folder) {
  const { code } = await run(['test', '-x', folder], { account, cwd: '/' });
  return code === 0;
}

/** The nearest folder of a path that exists. */
function existingParent(folder) {
  return fs.existsSync(folder) ? folder : existingParent(path.dirname(folder));
}

/**
 * Which folder to use, and why in words. As root the database runs under an account of its own, which cannot enter a
 * clone below a closed folder such as root's home; the data then go below the system's state directory, in a folder
 * named after the clone, so that two clones do not share one.
 */
export async function chooseDataFolder({ root, wanted, ownCluster }) {
  const account = ownCluster ? serverAccount() : null;
  if (wanted) {
    const folder = path.resolve(root, wanted);
    if (account && !(await canEnter(account, existingParent(folder)))) {
      throw new Problem(
        `The database's account (${account}) cannot enter ${folder}.`,
        'Choose another STAYLEDGER_DATA, or open the folders above it to be entered (chmod o+x).',
      );
    }
    return { folder, reason: 'as STAYLEDGER_DATA says' };
  }
  const inClone = path.join(root, '.data');
  if (!account || (await canEnter(account, existingParent(inClone))))
    return { folder: inClone, reason: 'in the clone' };
  const name = createHash('sha256').update(root).digest('hex').slice(0, 16);
  return {
    folder: path.join('/var/lib/stayledger', name),
    reason: `the account ${account} cannot enter ${root}`,
  };
}

/** Makes the folder. Others may pass through it (the database's account has to), but see nothing in it. */
export function openDataFolder(folder) {
  fs.mkdirSync(folder, { recursive: true });
  if (serverAccount()) {
    fs.chmodSync(folder, 0o711);
  } else {
    fs.chmodSync(folder, 0o700);
  }
  fs.mkdirSync(path.join(folder, 'files'), { recursive: true, mode: 0o700 });
}

function writeSecretly(file, text) {
  const draft = `${file}.new`;
  fs.rmSync(draft, { force: true });
  fs.writeFileSync(draft, text, { mode: 0o600, flag: 'wx' });
  fs.renameSync(draft, file);
}

/** The secrets of this installation, made at the first start and kept in a file that only we can read. */
export function readSecrets(folder) {
  const file = path.join(folder, 'secrets.json');
  let secrets = {};
  if (fs.existsSync(file)) {
    try {
      secrets = JSON.parse(fs.readFileSync(file, 'utf8'));
    } catch (error) {
      throw new Problem(`${file} cannot be read: ${error.message}`);
    }
  }
  const complete = {
    adminPassword: newPassword(),
    ownerPassword: newPassword(),
    appPassword: newPassword(),
    sessionSecret: randomBytes(48).toString('base64url'),
    ...secrets,
  };
  if (Object.keys(complete).some((name) => !(name in secrets))) {
    writeSecretly(file, `${JSON.stringify(complete, null, 2)}\n`);
  }
  return complete;
}

/** When a process began, in the kernel's ticks: with it, a process number names one process only. */
function startTicks(pid) {
  try {
    const stat = fs.readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The program's name stands in brackets and may hold spaces; the start is the 20th field after it.
    return stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19];
  } catch {
    return undefined;
  }
}

function describeProcess(pid) {
  return { pid, started: startTicks(pid) };
}

function stillRuns({ pid, started }) {
  return isAlive(pid) && startTicks(pid) === started;
}

/**
 * Makes sure that one starter at a time uses the folder, and that what a killed one left behind is gone. Resolves
 * with `{ add(pid), release() }`; processes named with `add` are waited for by the next start.
 */
export async function lockDataFolder(folder, note = () => {}) {
  const file = path.join(folder, 'start.lock');
  const holders = { starter: describeProcess(process.pid), children: [] };
  for (;;) {
    try {
      fs.writeFileSync(file, JSON.stringify(holders), { mode: 0o600, flag: 'wx' });
      break;
    } catch (error) {
      if (error.code !== 'EEXIST') throw error;
    }
    let left;
    try {
      left = JSON.parse(fs.readFileSync(file, 'utf8'));
    } catch {
      // Written by a starter that was killed in the middle of it, or removed just now.
      left = { children: [] };
    }
    if (left.starter && stillRuns(left.starter)) {
      throw new Problem(`Stayledger is running on ${folder} already (process ${left.starter.pid}).`);
    }
    for (let waited = 0; left.children.some(stillRuns); waited += 200) {
      if (waited === 0) note('waiting for the processes of a start that was killed');
      if (waited > 30_000) {
        const pids = left.children.filter(stillRuns).map(({ pid }) => pid);
        throw new Problem(
          `Processes of an earlier start are still there and do not end: ${pids.join(', ')}.`,
        );
      }
      await pause(200);
    }
    fs.rmSync(file, { force: true });
  }
  return {
    add(pid) {
      holders.children.push(describeProcess(pid));
      fs.writeFileSync(file, JSON.stringify(holders), { mode: 0o600 });
    },
    release() {
      fs.rmSync(file, { force: true });
    },
  };
}

import { spawn } from 'node:child_process';

/**
 * Spawning, waiting and stopping. Everything the set-up scripts start goes through here, so that a process
 * can be ended by its own handle and nothing else is ever touched.
 */

/** Prefix that runs a command as another account. Empty when we are to stay who we are. */
export function asAccount(account) {
  // A plain `su` would need a login shell for the account and would read its profile; setpriv only changes ids.
  return account ? ['setpriv', `--reuid=${account}`, `--regid=${account}`, '--clear-groups'] : [];
}

const runningCommands = new Set();

/** Ends the commands that `run` is waiting for: a stop in the middle of a step must not wait for its end. */
export function endRunningCommands() {
  for (const child of runningCommands) {
    child.kill('SIGTERM');
    // npm goes on installing after a TERM. What it leaves behind is redone by the next start.
    setTimeout(() => child.kill('SIGKILL'), 3_000).unref();
  }
}

/**
 * Runs a command to its end and collects what it said.
 * Resolves with `{ code, signal, stdout, stderr }`; a program that cannot be started gives code 127.
 * `uncuttable` protects a command that must not be ended half-way.
 */
export function run(command, { account, env, cwd, input, onOutput, uncuttable = false } = {}) {
  const [program, ...args] = [...asAccount(account), ...command];
  return new Promise((resolve) => {
    const child = spawn(program, args, {
      cwd,
      env: env ?? process.env,
      stdio: [input === undefined ? 'ignore' : 'pipe', 'pipe', 'pipe'],
    });
    if (!uncuttable) runningCommands.add(child);
    let stdout = '';
    let stderr = '';
    child.stdout.on('data', (chunk) => {
      stdout += chunk;
      onOutput?.(String(chunk));
    });
    child.stderr.on('data', (chunk) => {
      stderr += chunk;
      onOutput?.(String(chunk));
    });
    if (input !== undefined) child.stdin.end(input);
    const finish = (outcome) => {
      runningCommands.delete(child);
      resolve(outcome);
    };
    child.on('error', (error) => finish({ code: 127, signal: null, stdout, stderr: stderr + error.message }));
    child.on('close', (code, signal) => finish({ code: code ?? 1, signal, stdout, stderr }));
  });
}

/**
 * Starts a program that stays. It gets a session of its own, so a Ctrl-C typed at the terminal reaches us first
 * and we can end things in order; `deathSignal` is sent to it by the kernel should we be killed outright.
 */
export function spawnLasting(command, { account, env, cwd, stdio, deathSignal } = {}) {
  // setpriv sets the death signal after it has changed ids: a change of ids clears it.
  const prefix = asAccount(account);
  if (deathSignal) {
    if (prefix.length === 0) prefix.push('setpriv');
    prefix.push('--pdeathsig', deathSignal);
  }
  const [program, ...args] = [...prefix, ...command];
  const child = spawn(program, args, {
    cwd,
    env: env ?? process.env,
    stdio: stdio ?? 'ignore',
    detached: true,
  });
  const ended = new Promise((resolve) => {
    child.on('error', (error) => resolve({ code: 127, signal: null, error }));
    child.on('exit', (code, signal) => resolve({ code, signal }));
  });
  return { child, ended };
}

/** Waits for a promise, but no longer than `ms`; resolves with `undefined` when the time is over. */
export async function within(ms, promise) {
  let timer;
  const late = new Promise((resolve) => {
    timer = setTimeout(resolve, ms);
  });
  try {
    return await Promise.race([promise, late]);
  } finally {
    clearTimeout(timer);
  }
}

/** Sends a signal, waits for the end, and ends the process the hard way when it takes longer than `graceMs`. */
export async function endProcess({ child, ended }, signal, graceMs) {
  if (child.exitCode !== null || child.signalCode !== null || child.pid === undefined) return;
  child.kill(signal);
  if ((await within(graceMs, ended)) === undefined) {
    child.kill('SIGKILL');
    await ended;
  }
}

/** True when a process with this id exists (also when it belongs to somebody else). */
export function isAlive(pid) {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return error.code === 'EPERM';
  }
}

export function pause(ms) {
  return new Promise((resolve) => setTimeout(resolve, ms));
}

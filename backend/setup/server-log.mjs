import * as fs from 'node:fs';

/**
 * The server writes its log into a file and not into a pipe of ours: should we be killed, it can still write its last
 * lines while it drains. What a person at the terminal should see is read back from there.
 */

const ROTATE_ABOVE_BYTES = 20 * 1024 * 1024;
const READ_EVERY_MS = 100;

/** Opens the log for appending, after putting a large one aside. Gives its descriptor and where the new part begins. */
export function openServerLog(file) {
  if (fs.existsSync(file) && fs.statSync(file).size > ROTATE_ABOVE_BYTES) fs.renameSync(file, `${file}.1`);
  const descriptor = fs.openSync(file, 'a', 0o600);
  return { descriptor, from: fs.fstatSync(descriptor).size };
}

/**
 * Calls `onLine` for each whole line appended after byte `from`. `flush()` reads what is there by now; `stop()` does,
 * takes an unfinished last line too, and ends.
 */
export function followServerLog(file, from, onLine) {
  const descriptor = fs.openSync(file, 'r');
  const buffer = Buffer.alloc(64 * 1024);
  let position = from;
  let rest = Buffer.alloc(0);
  const read = () => {
    for (;;) {
      const length = fs.readSync(descriptor, buffer, 0, buffer.length, position);
      if (length === 0) return;
      position += length;
      rest = Buffer.concat([rest, buffer.subarray(0, length)]);
      for (let end = rest.indexOf(10); end >= 0; end = rest.indexOf(10)) {
        onLine(rest.subarray(0, end).toString());
        rest = rest.subarray(end + 1);
      }
    }
  };
  const timer = setInterval(read, READ_EVERY_MS);
  return {
    flush: read,
    stop() {
      clearInterval(timer);
      read();
      if (rest.length > 0) onLine(rest.toString());
      fs.closeSync(descriptor);
    },
  };
}

/**
 * What of a log line belongs on the terminal, or `null`: warnings and errors in plain words, and whatever is no log
 * record, such as a complaint about the environment or a crash.
 */
export function forTerminal(line) {
  let record;
  try {
    record = JSON.parse(line);
  } catch {
    return line.startsWith('stayledger: ready on ') ? null : line;
  }
  if (!record || typeof record !== 'object' || !record.level) return line;
  if (!['warn', 'error', 'fatal'].includes(record.level)) return null;
  const message = typeof record.message === 'string' ? record.message : JSON.stringify(record.message);
  return `${record.level}${record.context ? ` (${record.context})` : ''}: ${message}`;
}

/**
 * Ends a process in order at SIGTERM or SIGINT. Import it before everything else: loading the rest takes seconds in
 * which a signal would otherwise end the process as if something had gone wrong.
 */

/** Everything must be put down within this time after we are told to stop. */
const STOP_WITHIN_MS = 9_000;

let stopService: (() => Promise<void>) | null = null;
let stopping = false;

/**
 * Says how to stop. Until then there is nothing to put down, and a signal ends the process at once, with status 0.
 *
 * @param stop ends what runs; the process ends after it, since Bull leaves connections behind that would keep it alive
 */
export function stopOnSignals(stop: () => Promise<void>): void {
  stopService = stop;
}

function onSignal(): void {
  // A second signal is no second wish, since Ctrl-C arrives from the terminal and from npm.
  if (stopping) return;
  stopping = true;
  if (stopService === null) process.exit(0);
  setTimeout(() => process.exit(0), STOP_WITHIN_MS).unref();
  stopService().then(
    () => process.exit(0),
    (error: unknown) => {
      console.error(error);
      process.exit(1);
    },
  );
}

process.on('SIGTERM', onSignal);
process.on('SIGINT', onSignal);

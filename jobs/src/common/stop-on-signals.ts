/** Everything must be put down within this time after we are told to stop. */
const STOP_WITHIN_MS = 9_000;

/**
 * Stops in order at SIGTERM or SIGINT and ends the process: Bull leaves connections behind that would keep it alive.
 * A second signal is no second wish, since Ctrl-C arrives from the terminal and from npm.
 */
export function stopOnSignals(stop: () => Promise<void>): void {
  let stopping = false;
  const onSignal = (): void => {
    if (stopping) return;
    stopping = true;
    setTimeout(() => process.exit(0), STOP_WITHIN_MS).unref();
    stop().then(
      () => process.exit(0),
      (error: unknown) => {
        console.error(error);
        process.exit(1);
      },
    );
  };
  process.on('SIGTERM', onSignal);
  process.on('SIGINT', onSignal);
}

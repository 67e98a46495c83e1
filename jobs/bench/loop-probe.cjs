const { monitorEventLoopDelay } = require('node:perf_hooks');
const { isMainThread } = require('node:worker_threads');

/**
 * Loaded into the service by the bench: measures how late its event loop is, and tells when asked. Each question also
 * begins the next stretch.
 */

const RESOLUTION_MS = 5;

if (isMainThread && process.send) {
  const delays = monitorEventLoopDelay({ resolution: RESOLUTION_MS });
  delays.enable();
  process.on('message', () => {
    // The time between two looks is recorded; what goes beyond the wanted interval is the delay.
    const over = (nanoseconds) => Math.max(0, nanoseconds / 1e6 - RESOLUTION_MS);
    process.send({ p99Ms: over(delays.percentile(99)), maxMs: over(delays.max) });
    delays.reset();
  });
}

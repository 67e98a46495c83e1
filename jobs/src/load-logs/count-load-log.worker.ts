import { setPriority } from 'node:os';
import type { MessagePort } from 'node:worker_threads';
import type { LoadLogConfig } from '@stayledger/shared/fatigue/load-history/load-log';
import { encodeSpectrum } from '@stayledger/shared/fatigue/rainflow/spectrum-codec';
import { BadFileError } from './bad-file-error.js';
import { countFile } from './count-file.js';
import { roundingShare } from './counting-step.js';
import type { CountedChannel, CountOutcome } from './count-outcome.js';

/** On Linux this lowers the priority of the thread alone: requests are answered while logs are counted. */
const NICE = 15;
const PROGRESS_EVERY_MS = 1000;
/** Curves of rigging are not steeper where most of the damage is done. */
const STEEPEST_SLOPE = 5;

setPriority(0, NICE);

export interface CountTask {
  path: string;
  config: LoadLogConfig;
  /** Receives the bytes read so far, once a second at most. */
  port: MessagePort;
}

/** One file, counted in a thread of its own. A bad file is an outcome; anything thrown is a fault of the machine. */
export default async function count({ path, config, port }: CountTask): Promise<CountOutcome> {
  let told = performance.now();
  try {
    const result = await countFile(path, config, (bytesRead) => {
      const now = performance.now();
      if (now - told < PROGRESS_EVERY_MS) return;
      told = now;
      port.postMessage(bytesRead);
    });
    const channels = result.channels.map((channel): CountedChannel => {
      // Each access would make the spectrum anew.
      const spectrum = channel.spectrum;
      let closedCycles = 0;
      for (const { cycles } of spectrum.days) for (const times of cycles.count) closedCycles += times;
      return {
        column: channel.column,
        step: spectrum.step,
        samples: channel.samples,
        missing: channel.missing,
        turningPoints: spectrum.turningPoints,
        closedCycles,
        minKn: Number.isNaN(channel.minKn) ? null : channel.minKn,
        maxKn: Number.isNaN(channel.maxKn) ? null : channel.maxKn,
        maxAtMs: channel.maxAtMs,
        envelope: channel.envelope,
        roundingShare: roundingShare(spectrum, STEEPEST_SLOPE),
        spectrum: encodeSpectrum(spectrum),
      };
    });
    const { rows, fromMs, toMs, loggedHours, sampleRateHz, findings } = result;
    return { ok: true, rows, fromMs, toMs, loggedHours, sampleRateHz, findings, channels };
  } catch (error) {
    if (error instanceof BadFileError) return { ok: false, code: error.code, message: error.message };
    throw error;
  } finally {
    port.close();
  }
}

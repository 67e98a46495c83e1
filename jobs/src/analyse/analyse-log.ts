import { damageOfCounts } from '@stayledger/shared/fatigue/damage/damage-of-counts';
import { MeanAboveUltimateError } from '@stayledger/shared/fatigue/damage/mean-above-ultimate-error';
import { LoadLogCounter } from '@stayledger/shared/fatigue/load-history/load-log-counter';
import type { ChannelResult, LogFinding } from '@stayledger/shared/fatigue/load-history/load-log';
import { recogniseLog, RECOGNITION_BYTES } from '@stayledger/shared/fatigue/load-history/recognise-log';
import { unitOfColumn } from '@stayledger/shared/fatigue/load-history/unit-of-column';
import { astmCounts } from '@stayledger/shared/fatigue/rainflow/astm-counts';
import { closeTies } from '@stayledger/shared/fatigue/rainflow/close-ties';
import type { CycleCount } from '@stayledger/shared/fatigue/rainflow/cycle-count';
import { dropSmallRanges } from '@stayledger/shared/fatigue/rainflow/drop-small-ranges';
import { AnalyseError } from './analyse-error.js';
import type { AnalyseChannel, AnalyseConfig } from './read-config.js';

/** What the command says about one channel. */
export interface AnalysedChannel {
  column: string;
  samples: number;
  /** Unfiltered: first and last sample included, repeated values once. */
  turningPoints: number;
  closedCycles: number;
  /** kN. */
  residue: number[];
  /** ASTM E1049 view: closed cycles as 1, residue pairs as 0.5. */
  counts: CycleCount[];
  details: { name: string; damage: number }[];
}

/** The command's answer. */
export interface Analysis {
  rows: number;
  channels: AnalysedChannel[];
  findings: LogFinding[];
}

/** At the shell exactness comes first: coarsening only where memory would not bear the log at all. */
const SHELL_BOUNDS = { residuePoints: 20_000_000, cycles: 20_000_000 };

/**
 * Counts a log and evaluates its details.
 *
 * @param bytes the log's text in pieces
 * @throws LogConfigError when the log lacks a column; AnalyseError when a counted mean reaches the ultimate
 */
export async function analyseLog(config: AnalyseConfig, bytes: AsyncIterable<Uint8Array>): Promise<Analysis> {
  let counter: LoadLogCounter | null = null;
  let waiting: Uint8Array[] = [];
  let waitingSize = 0;
  const begin = () => {
    const head = Buffer.concat(waiting);
    const begun = counterFor(config, head);
    begun.push(head);
    waiting = [];
    return begun;
  };
  for await (const chunk of bytes) {
    if (counter !== null) {
      counter.push(chunk);
      continue;
    }
    waiting.push(chunk);
    waitingSize += chunk.length;
    if (waitingSize >= RECOGNITION_BYTES) counter = begin();
  }
  const { rows, channels, findings } = (counter ?? begin()).finish();
  return {
    rows,
    channels: config.channels.map((channel, index) => analyseChannel(channel, index, channels[index])),
    findings,
  };
}

/** Units the configuration leaves to the header are looked up there. */
function counterFor(config: AnalyseConfig, head: Uint8Array): LoadLogCounter {
  const recognition = recogniseLog(head.subarray(0, RECOGNITION_BYTES), config);
  return new LoadLogCounter({
    ...config,
    channels: config.channels.map(({ column, unit, step, limitKn }) => ({
      column,
      unit: unit ?? unitOfColumn(recognition, column) ?? 'kN',
      step,
      ...(limitKn === undefined ? {} : { limitKn }),
    })),
    bounds: SHELL_BOUNDS,
  });
}

function analyseChannel(channel: AnalyseChannel, index: number, result: ChannelResult): AnalysedChannel {
  const spectrum = dropSmallRanges(result.spectrum, channel.hysteresis);
  const { closedCycles, residue } = closeTies(spectrum);
  const counts = astmCounts(spectrum);
  return {
    column: channel.column,
    samples: result.samples,
    turningPoints: spectrum.turningPoints,
    closedCycles,
    residue,
    counts,
    details: channel.details.map(({ name, factor, curve, mean }) => {
      try {
        return { name, damage: damageOfCounts(counts, { factor, curve, mean }) };
      } catch (error) {
        if (!(error instanceof MeanAboveUltimateError)) throw error;
        throw new AnalyseError(
          `channels[${index}] ("${channel.column}"), detail "${name}": a counted mean of ${error.mean} is at or above the ultimate ${error.limit}`,
        );
      }
    }),
  };
}

import type { BenchRow } from './bench-row.js';

/**
 * All measurements, in the order of the table. Each is loaded only when it runs. To add one: write `<name>.row.ts`
 * beside this file and name it here with its values.
 */
export const REGISTRY: { values: string[]; load: () => Promise<BenchRow> }[] = [
  {
    values: ['countingSmooth', 'countingNoisy'],
    load: async () => (await import('./counting.row.js')).countingRow,
  },
  {
    values: ['csvOverByteLoop', 'scanOverByteLoop'],
    load: async () => (await import('./csv.row.js')).csvRow,
  },
  { values: ['scanOverPackage'], load: async () => (await import('./packages.row.js')).packagesRow },
  { values: ['twoThreads'], load: async () => (await import('./threads.row.js')).threadsRow },
  { values: ['gzOverInflate'], load: async () => (await import('./gzip.row.js')).gzipRow },
  {
    values: ['memoryMiB', 'memoryGrowthMiB', 'exponent'],
    load: async () => (await import('./growth.row.js')).growthRow,
  },
  { values: ['lifeMergeMs', 'newCurveMs'], load: async () => (await import('./season.row.js')).seasonRow },
  {
    values: ['planVesselMs', 'planVesselGap'],
    load: async () => (await import('./rerig-schedule.row.js')).planVesselRow,
  },
  {
    values: ['planFirmS', 'planFirmGap'],
    load: async () => (await import('./rerig-schedule.row.js')).planFirmRow,
  },
  {
    values: ['calibration90', 'calibrationBias'],
    load: async () => (await import('./calibration.row.js')).calibrationRow,
  },
  {
    values: ['apiP95Ratio', 'loopDelayP99Ms'],
    load: async () => (await import('./api.row.js')).apiRow,
  },
  {
    values: ['initialKB', 'largestRouteKB'],
    load: async () => (await import('./web-size.row.js')).webSizeRow,
  },
  { values: ['compareMs'], load: async () => (await import('./compare.row.js')).compareRow },
];

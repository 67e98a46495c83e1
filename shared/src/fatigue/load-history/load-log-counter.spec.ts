import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { encodeSpectrum } from '../rainflow/spectrum-codec.js';
import { spectrumOf } from '../rainflow/spectrum-of.js';
import { ENVELOPE_BUCKETS } from './envelope-clock.js';
import { LoadLogCounter } from './load-log-counter.js';
import type { ChannelConfig, LoadLogConfig, LoadLogResult } from './load-log.js';

const START_MS = Date.parse('2026-06-01T12:00:00Z');

function count(text: string, config: LoadLogConfig, chunkBytes = Infinity): LoadLogResult {
  const bytes = Uint8Array.from(text, (character) => character.charCodeAt(0));
  const counter = new LoadLogCounter(config);
  for (let from = 0; from < bytes.length; from += chunkBytes) {
    counter.push(bytes.subarray(from, Math.min(bytes.length, from + chunkBytes)));
  }
  return counter.finish();
}

const channel = (column: string, more: Partial<ChannelConfig> = {}): ChannelConfig => ({
  column,
  unit: 'kN',
  step: 0,
  ...more,
});

/** A log at 1 Hz with one column of kN and, if given, a second one. */
function log(loads: number[], others?: number[]): string {
  const rows = loads.map((load, i) => {
    const time = new Date(START_MS + i * 1000).toISOString();
    return `${time},${load}${others === undefined ? '' : `,${others[i]}`}\n`;
  });
  return `time,stay${others === undefined ? '' : ',shroud'}\n${rows.join('')}`;
}

const TIMED: LoadLogConfig = { time: { column: 'time' }, channels: [channel('stay')] };
const codesOf = ({ findings }: LoadLogResult) => findings.map(({ code }) => code);

/** A gentle swell, different from row to row, for logs in which nothing is wrong. */
const swell = (rows: number, periodS = 12) =>
  Array.from({ length: rows }, (_, i) =>
    Number((10 + 3 * Math.sin((2 * Math.PI * i) / periodS + i / 977)).toFixed(3)),
  );

describe('counting a log', () => {
  it('gives each column the spectrum of its loads', () => {
    const loads = swell(5000);
    const others = swell(5000, 7);
    const result = count(log(loads, others), {
      time: { column: 'time' },
      channels: [channel('stay'), channel('shroud', { step: 0.05 }), channel('stay', { step: 0.5 })],
    });
    const day = Math.floor(START_MS / 86_400_000);
    expect(result.rows).toBe(5000);
    expect(result.channels.map(({ spectrum }) => spectrum)).toEqual([
      spectrumOf(loads, { day }),
      spectrumOf(others, { day, step: 0.05 }),
      spectrumOf(loads, { day, step: 0.5 }),
    ]);
    expect(result.findings).toEqual([]);
    expect(result).toMatchObject({ fromMs: START_MS, toMs: START_MS + 4_999_000, sampleRateHz: 1 });
    expect(result.loggedHours).toBeCloseTo(5000 / 3600, 12);
    expect(result.channels[0]).toMatchObject({
      samples: 5000,
      missing: 0,
      minKn: Math.min(...loads),
      maxKn: Math.max(...loads),
      maxAtMs: START_MS + loads.indexOf(Math.max(...loads)) * 1000,
    });
  });

  it('does not depend on the chunks', () => {
    const cell = fc.constantFrom('1', '5.5', '-2', '', 'x', '"3"', '9', '4.25');
    const rows = fc.array(fc.tuple(cell, cell), { maxLength: 40 });
    fc.assert(
      fc.property(rows, fc.integer({ min: 1, max: 50 }), (cells, size) => {
        const text = `time,a,b\n${cells
          .map(([a, b], i) => `${new Date(START_MS + i * 7_000_000).toISOString()},${a},${b}\n`)
          .join('')}`;
        const config: LoadLogConfig = {
          time: { column: 'time' },
          channels: [channel('a'), channel('b', { step: 0.5 })],
        };
        const whole = count(text, config);
        const cut = count(text, config, size);
        // As text: the matcher would take long over the envelopes.
        expect(JSON.stringify(cut)).toBe(JSON.stringify(whole));
        cut.channels.forEach(({ spectrum }, i) =>
          expect(encodeSpectrum(spectrum)).toEqual(encodeSpectrum(whole.channels[i].spectrum)),
        );
      }),
      { numRuns: 300 },
    );
  });

  it('converts units before the grid', () => {
    const text = 'a_N,b_lbf\n12345,1000\n2345,2000\n9345,500\n';
    const { channels } = count(text, {
      time: { rateHz: 1 },
      channels: [channel('a', { unit: 'N' }), channel('b', { unit: 'lbf', step: 0.001 })],
    });
    expect([...channels[0].spectrum.residue]).toEqual([12.345, 2.345, 9.345]);
    // 1000 lbf = 4.448 2216 kN, 2000 lbf = 8.896 4432 kN, 500 lbf = 2.224 1108 kN.
    expect([...channels[1].spectrum.residue]).toEqual([4448, 8896, 2224]);
  });

  it('puts cycles on the days of the vessel, also when its clocks change', () => {
    // Peaks at 23:30 UTC are the next day in a zone one hour ahead; before the change the zone is UTC.
    const times = [
      '2026-03-28T23:30:00Z',
      '2026-03-28T23:40:00Z',
      '2026-03-29T23:30:00Z',
      '2026-03-29T23:40:00Z',
    ];
    const loads = [
      [0, 5],
      [1, 4],
      [0, 6],
      [1, 7],
    ].map(([low, high], i) => `${times[i]},${high}\n${times[i]},${low}\n`);
    const { channels } = count(`time,stay\n${loads.join('')}`, {
      ...TIMED,
      zoneOffsets: [
        { fromMs: Date.parse('2025-10-26T01:00:00Z'), offsetMinutes: 0 },
        { fromMs: Date.parse('2026-03-29T01:00:00Z'), offsetMinutes: 60 },
      ],
    });
    const days = [...channels[0].spectrum.residueDay, ...channels[0].spectrum.days.map(({ day }) => day)];
    const dayOf = (text: string) => Date.parse(text) / 86_400_000;
    expect(new Set(days)).toEqual(new Set([dayOf('2026-03-28'), dayOf('2026-03-30')]));
  });

  it('has day 0 and no instants without times', () => {
    const result = count('stay\n1\n5\n2\n6\n', { time: { rateHz: 2 }, channels: [channel('stay')] });
    expect(result).toMatchObject({
      rows: 4,
      fromMs: null,
      toMs: null,
      sampleRateHz: 2,
      loggedHours: 4 / 2 / 3600,
    });
    expect(result.channels[0].spectrum.days.map(({ day }) => day)).toEqual([0]);
    expect(result.channels[0].maxAtMs).toBeNull();
  });

  it('finds its columns by header, by name without unit, below remarks and units', () => {
    const text = 'Boat\n\nWhen;Cap Port [kN]\n-;kN\n2026-06-01 12:00;1,5\n2026-06-01 12:01;2,5\n';
    for (const column of ['Cap Port [kN]', 'Cap Port', 'cap port']) {
      const { rows, channels } = count(text, { time: { column: 'When' }, channels: [channel(column)] });
      expect(rows).toBe(2);
      expect([...channels[0].spectrum.residue]).toEqual([1.5, 2.5]);
    }
  });

  it('keeps a first row that is unreadable or empty', () => {
    expect(count('stay\nbad\n1\n2\n', { time: { rateHz: 1 }, channels: [channel('stay')] }).rows).toBe(3);
    expect(count('t,stay\n,\n1,2\n', { time: { rateHz: 1 }, channels: [channel('stay')] }).rows).toBe(2);
  });
});

describe('what cannot be counted', () => {
  it('is refused with the place', () => {
    expect(() => count(log([1]), { ...TIMED, channels: [channel('mast')] })).toThrow(
      'the log has no column "mast"; it has "time", "stay"',
    );
    expect(() => count('a,a\n1,2\n', { time: { rateHz: 1 }, channels: [channel('a')] })).toThrow(
      /twice, as columns 1 and 2/,
    );
    expect(() => count(log([1]), { time: { column: 'stay' }, channels: [channel('stay')] })).toThrow(
      /as time and as a load/,
    );
    expect(() => count('a\u0000b', TIMED)).toThrow(/not a text table/);
    expect(() => new LoadLogCounter({ ...TIMED, channels: [] })).toThrow(/no channel/);
    expect(() => new LoadLogCounter({ ...TIMED, channels: [channel('a', { step: -1 })] })).toThrow(/step/);
    expect(() => new LoadLogCounter({ channels: [channel('a')], time: { rateHz: 0 } })).toThrow(/rate/);
  });
});

describe('findings', () => {
  it('about time: gaps, backward and repeated clocks', () => {
    const at = (seconds: number, load: number) =>
      `${new Date(START_MS + seconds * 1000).toISOString()},${load}\n`;
    const seconds = [0, 1, 2, 3, 4, 4, 5, 100, 101, 50, 51];
    const result = count(`time,stay\n${seconds.map(at).join('')}`, { ...TIMED, gapLimitS: 10 });
    expect(result.findings.map(({ code, count: times, line }) => [code, times, line])).toEqual([
      ['time-repeated', 1, 7],
      ['gap', 1, 9],
      ['time-backwards', 1, 11],
    ]);
    expect(result.findings[1]).toMatchObject({ fromMs: START_MS + 5000, toMs: START_MS + 100_000 });
    // Logged: 0..5, 100..101 and 50..51, and the second each of the three stretches ends with.
    expect(result.loggedHours).toBeCloseTo((5 + 1 + 1 + 3) / 3600, 12);
    expect(result).toMatchObject({ fromMs: START_MS, toMs: START_MS + 101_000 });
  });

  it('about cells and rows, with the first line and how many', () => {
    const result = count(
      'time,stay\n2026-06-01T12:00:00Z,1\nnoon,2\n2026-06-01T12:00:02Z,x\n2026-06-01T12:00:03Z,\n2026-06-01T12:00:04Z\n2026-06-01T12:00:05Z,7',
      TIMED,
    );
    expect(result.findings.map(({ code, count: times, line }) => [code, times, line])).toEqual([
      ['time-unreadable', 1, 3],
      ['unreadable-cell', 1, 4],
      ['short-row', 1, 6],
      ['missing-cell', 1, undefined],
    ]);
    expect(result.channels[0]).toMatchObject({ samples: 3, missing: 3 });
    expect(codesOf(count('time,stay,x\n2026-06-01T12:00:00Z,1,2\n2026-06-01T12:00:01Z', TIMED))).toEqual([
      'truncated',
    ]);
    expect(codesOf(count('time,stay\n', TIMED))).toEqual(['no-rows']);
  });

  it('about times that name no zone', () => {
    expect(codesOf(count('time,stay\n2026-06-01 12:00:00,1\n', TIMED))).toEqual(['time-ambiguous']);
    const said: LoadLogConfig = { ...TIMED, time: { column: 'time', utcOffsetMinutesForNaive: 60 } };
    expect(codesOf(count('time,stay\n2026-06-01 12:00:00,1\n', said))).toEqual([]);
  });

  it('about loads above what is possible, and a unit that seems wrong', () => {
    const loads = swell(1000);
    const high = count(log(loads.map((load, i) => (i === 500 ? 80 : load))), {
      ...TIMED,
      channels: [channel('stay', { limitKn: 50 })],
    });
    expect(high.findings.find(({ code }) => code === 'implausible-load')).toMatchObject({
      count: 1,
      line: 502,
    });
    const newtons = count(log(loads.map((load) => load * 1000)), {
      ...TIMED,
      channels: [channel('stay', { limitKn: 50 })],
    });
    expect(codesOf(newtons)).toContain('unit-doubt');
    const header = count(log(loads).replace('stay', 'stay_daN'), { ...TIMED, channels: [channel('stay')] });
    expect(codesOf(header)).toEqual(['unit-doubt']);
  });

  it('about a sensor that stands still while others move, but not about a slack part', () => {
    const moving = swell(2000);
    const stuck = moving.map((load, i) => (i >= 600 && i < 900 ? 12.345 : load));
    const both: LoadLogConfig = { time: { column: 'time' }, channels: [channel('stay'), channel('shroud')] };
    const found = count(log(stuck, moving), both).findings;
    expect(found.map(({ code, column }) => [code, column])).toEqual([['stuck', 'stay']]);
    const slack = moving.map((load, i) => (i >= 600 && i < 900 ? 0 : load));
    expect(codesOf(count(log(slack, moving), both))).toEqual([]);
    const calm = moving.map((load, i) => (i >= 600 && i < 900 ? 11 : load));
    expect(codesOf(count(log(stuck, calm), both))).toEqual([]);
  });

  it('about a flat top, and a peak of a single sample', () => {
    const loads = swell(3000);
    expect(codesOf(count(log(loads.map((load) => Math.min(load, 12))), TIMED))).toEqual(['saturation']);
    const spiked = count(log(loads.map((load, i) => (i === 1500 ? 40 : load))), TIMED);
    expect(spiked.findings).toMatchObject([{ code: 'spike', line: 1502, fromMs: START_MS + 1_500_000 }]);
    expect(spiked.channels[0].maxKn).toBe(40);
  });

  it('about a rate too low for what moves, and averages', () => {
    expect(codesOf(count(log(swell(3000, 2.6)), TIMED))).toEqual(['low-rate']);
    const averaged = log(swell(100)).replace('stay', 'stay_avg_kN');
    expect(codesOf(count(averaged, { ...TIMED, channels: [channel('stay_avg')] }))).toEqual(['averaged']);
  });

  it('about more different loads than can be held: counted on a coarser grid, never unbounded', () => {
    const loads = Array.from({ length: 20_000 }, (_, i) => ((i * 7919) % 20_011) / 7.13);
    const bounded = count(log(loads), { ...TIMED, bounds: { residuePoints: 500, cycles: 500 } });
    const { spectrum } = bounded.channels[0];
    expect(codesOf(bounded)).toContain('residue-capped');
    expect(spectrum.step).toBeGreaterThan(0);
    // Exact for the rounded history: the largest cycle is within a step of the true one.
    const exact = spectrumOf(loads);
    expect(Math.max(...spectrum.residue) * spectrum.step).toBeCloseTo(
      Math.max(...exact.residue),
      -Math.log10(spectrum.step * 2),
    );
    expect(spectrum.samples).toBe(20_000);
  });
});

describe('the envelope', () => {
  it('holds every extreme in at most 4096 buckets, however long the log', () => {
    const loads = swell(30_000).map((load, i) => (i % 4999 === 17 ? 55 + i / 1e5 : load));
    const { envelope } = count(log(loads), TIMED).channels[0];
    expect(envelope.maxKn.length).toBeLessThanOrEqual(ENVELOPE_BUCKETS);
    const outside = loads.filter((load, i) => {
      const bucket = Math.floor((START_MS + i * 1000 - envelope.fromMs) / envelope.bucketMs);
      return !(load <= envelope.maxKn[bucket] && load >= envelope.minKn[bucket]);
    });
    expect(outside).toEqual([]);
    expect(Math.max(...envelope.maxKn)).toBe(Math.max(...loads));
    expect(Math.min(...envelope.minKn)).toBe(Math.min(...loads));
  });

  it('copes with one absurd time', () => {
    const text = `${log(swell(100))}1970-01-01T00:00:00Z,3\n${new Date(START_MS + 200_000).toISOString()},4\n`;
    const { envelope } = count(text, TIMED).channels[0];
    expect(envelope.maxKn.length).toBeLessThanOrEqual(ENVELOPE_BUCKETS);
    expect(Number.isNaN(envelope.maxKn[1])).toBe(true);
    expect(envelope.maxKn[0]).toBe(3);
  });
});

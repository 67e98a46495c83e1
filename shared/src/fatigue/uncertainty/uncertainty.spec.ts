import { describe, expect, it } from 'vitest';
import type { Curve, ReferenceCurve } from '../curves/curve.js';
import { damageOfSpectrum } from '../damage/damage-of-spectrum.js';
import type { DetailModel } from '../damage/detail-model.js';
import { ruleDate } from '../life/rule-date.js';
import { cycleTableOf } from '../rainflow/cycle-table.js';
import { emptySpectrum, type LoadSpectrum } from '../rainflow/load-spectrum.js';
import { failureProbability, totalLnSd, yearsToProbability } from '../statistics/failure-probability.js';
import { fastNormalCdf } from '../statistics/fast-normal-cdf.js';
import { lnSdOfCov, lognormalMedian } from '../statistics/lognormal.js';
import { normalCdf } from '../statistics/normal.js';
import { normalSource } from '../statistics/normal-source.js';
import { randomStreams } from '../statistics/random-streams.js';
import { seededRandom } from '../statistics/seeded-random.js';
import { basisCov } from './basis-cov.js';
import { curveLnSd } from './curve-ln-sd.js';
import { damageGrid } from './damage-grid.js';
import { damageOnGrid, GRID_SIZE, lnNode } from './damage-on-grid.js';
import { detailRecord } from './detail-record.js';
import { failureProbabilityAt } from './failure-probability-at.js';
import { failureProbabilityByDate } from './failure-probability-by-date.js';
import { fatigueReplaceBy } from './fatigue-replace-by.js';
import { forecastFan } from './forecast-fan.js';
import { gainDoubt } from './gain-doubt.js';
import { lifeDraws } from './life-draws.js';
import { MINER_COV, type PartRecord, type UseRecord } from './life-record.js';
import { type Doubt, partLife } from './part-life.js';
import { notCoveredHours } from './not-covered-hours.js';
import { provisionalRange } from './provisional-range.js';
import { reliabilityDate } from './reliability-date.js';
import { seasonCov } from './season-cov.js';
import { spreadShares } from './spread-shares.js';
import { stressModelCov } from './stress-model-cov.js';
import { targetProbability } from './target-probability.js';
import { vesselFailureProbability } from './vessel-failure-probability.js';
import { whatWouldNarrow } from './what-would-narrow.js';
import { yearsToFailureProbability } from './years-to-failure-probability.js';
import { yearsToLevel } from './years-to-level.js';

const TWO_SLOPES: Curve = {
  segments: [
    { above: 4, m: 4, log10a: 4 * Math.log10(4) + 6 },
    { above: 0, m: 6, log10a: 6 * Math.log10(4) + 6 },
  ],
};
/** Some thirty years at the plan below. */
const ONE_SLOPE: Curve = { segments: [{ above: 0, m: 4, log10a: 9.6 }] };

function detailOn(curve: Curve, more: Partial<DetailModel> = {}): DetailModel {
  return {
    factor: 1,
    stressConcentration: 1,
    sizeFactor: 1,
    lifeDivisor: 1,
    cutOff: 'as-curve',
    mean: { kind: 'none' },
    endBending: null,
    curve,
    ...more,
  };
}

/** Days of ranges spread evenly up to a highest one that differs from day to day. */
function spectrumOfDays(highest: readonly number[], step = 0.01): LoadSpectrum {
  return {
    ...emptySpectrum(step),
    days: highest.map((top, day) => {
      const high = Array.from({ length: 10 }, (_, i) => Math.round((2 + (top * (i + 1)) / 10) / step));
      return {
        day,
        cycles: cycleTableOf(
          high.map(() => Math.round(2 / step)),
          high,
          high.map(() => 500),
        ),
      };
    }),
  };
}

interface Made {
  use: UseRecord;
  part: PartRecord;
}

/** A vessel of one group that sails five hours on each recorded day. */
function vessel(
  highest: readonly number[],
  doubts: Partial<{
    gainCov: number;
    stressCov: number;
    seasonCov: number;
    curveLnSd: number;
    minerCov: number;
    hours: number;
    carriedInHours: number;
    unloggedHours: number;
    curve: Curve;
  }> = {},
): Made {
  const days = highest.map((_, day) => day);
  return {
    use: {
      groups: [{ state: 'sailing', band: null }],
      days: days.map(() => ({ season: 0, loggedHours: [5], unloggedHours: [0] })),
      otherUnloggedHours: [doubts.unloggedHours ?? 0],
      plannedHoursPerYear: { sailing: doubts.hours ?? 500 },
      seasonCov: doubts.seasonCov ?? 0,
      calibrations: [{ key: 'cell', gainCov: doubts.gainCov ?? 0 }],
    },
    part: {
      key: 'cap-port',
      name: 'cap shroud, port',
      lossDropsMast: true,
      basisCov: 0,
      carriedInHours: doubts.carriedInHours ?? 0,
      minerCov: doubts.minerCov ?? 0,
      details: [
        {
          key: 'wire',
          name: 'free length',
          grid: damageGrid(
            spectrumOfDays(highest),
            detailOn(doubts.curve ?? ONE_SLOPE),
            days,
            Math.hypot(doubts.gainCov ?? 0, doubts.stressCov ?? 0),
          ),
          shares: days.map((day) => ({ day, group: 0, share: 1 })),
          calibrationOfDay: days.map(() => 0),
          designOverMean: 2.5,
          designFatigueFactor: 3,
          curveLnSd: doubts.curveLnSd ?? 0,
          stressCov: doubts.stressCov ?? 0,
          sampling: { factor: 1, lnSd: 0 },
        },
      ],
    },
  };
}

const EVEN = new Array<number>(50).fill(6);
const UNEVEN = Array.from({ length: 50 }, (_, day) => 4 + ((day * 7) % 11) * 0.5);
const draw = ({ use }: Made, draws = 1000, seed = 1) => lifeDraws(use, randomStreams(seed), { draws });

describe('damage at factors on the range', () => {
  const spectrum = spectrumOfDays(UNEVEN);

  it('meets working damage out again within 0.05 % between the nodes, across the knee', () => {
    const detail = detailOn(TWO_SLOPES);
    const grid = damageGrid(spectrum, detail, [0], 0.2);
    for (const lnFactor of [-0.63, -0.31, -0.05, 0.11, 0.34, 0.66]) {
      const exact = damageOfSpectrum(
        spectrum,
        detailOn(TWO_SLOPES, { sizeFactor: Math.exp(lnFactor) }),
      ).damage;
      expect(Math.abs(damageOnGrid(grid.total, 0, grid.lnStep, lnFactor) / exact - 1)).toBeLessThan(5e-4);
    }
  });

  it('is the power law on one slope, also beyond the grid', () => {
    const grid = damageGrid(spectrum, detailOn(ONE_SLOPE), [0], 0.1);
    for (const lnFactor of [-1.2, -0.2, 0, 0.3, 1.5]) {
      const ratio = damageOnGrid(grid.total, 0, grid.lnStep, lnFactor) / grid.total[4];
      expect(ratio).toBeCloseTo(Math.exp(4 * lnFactor), 9);
    }
  });

  it('splits by day, and the days make the whole', () => {
    const days = UNEVEN.map((_, day) => day);
    const grid = damageGrid(spectrum, detailOn(TWO_SLOPES), days, 0.1);
    for (let node = 0; node < GRID_SIZE; node++) {
      let sum = 0;
      for (const day of days) sum += grid.byDay[day * GRID_SIZE + node];
      expect(Math.abs(sum / grid.total[node] - 1)).toBeLessThan(1e-12);
    }
  });

  it('knows which factor on the range a gain stands for where bending has a say', () => {
    const bending = { fixedMisalignmentRad: 0.02, swingRad: 0, youngMpa: 100 };
    const detail = detailOn(ONE_SLOPE, { endBending: bending });
    const grid = damageGrid(spectrum, detail, [0], 0.1);
    for (let node = 0; node < GRID_SIZE; node++) {
      const gain = Math.exp(lnNode(node, grid.lnStep));
      const exact = damageOfSpectrum(spectrum, { ...detail, factor: gain }).damage;
      const found = damageOnGrid(grid.total, 0, grid.lnStep, grid.lnRangeOfGain[node]);
      expect(Math.abs(found / exact - 1)).toBeLessThan(1e-6);
      // Bending grows with the root of the load only, so a gain does less than the same factor on the range.
      if (node > 4) expect(grid.lnRangeOfGain[node]).toBeLessThan(lnNode(node, grid.lnStep));
    }
  });

  it('stays at nothing below a cut-off', () => {
    const cut: Curve = { segments: [{ above: 100, m: 4, log10a: 8 }] };
    const grid = damageGrid(spectrum, detailOn(cut), [0], 0.1);
    expect(damageOnGrid(grid.total, 0, grid.lnStep, 0.07)).toBe(0);
  });
});

describe('drawing', () => {
  it('has normal numbers: share below -1.96, 0 and 1.645 (table of the normal distribution)', () => {
    const normal = normalSource(seededRandom(5));
    const values = Array.from({ length: 100_000 }, normal);
    const below = (bound: number) => values.filter((value) => value < bound).length / values.length;
    // Standard errors 0.0005, 0.0016, 0.0007; four of each.
    expect(Math.abs(below(-1.959964) - 0.025)).toBeLessThan(0.002);
    expect(Math.abs(below(0) - 0.5)).toBeLessThan(0.0064);
    expect(Math.abs(below(1.644854) - 0.95)).toBeLessThan(0.0028);
  });

  it('agrees with the slow normal distribution to eight digits, down to 1e-30', () => {
    for (let x = -12; x <= 12; x += 0.037) {
      const slow = normalCdf(x);
      expect(Math.abs(fastNormalCdf(x) - slow)).toBeLessThan(1e-8 * Math.max(slow, 1e-30));
    }
    expect([fastNormalCdf(-50), fastNormalCdf(50), fastNormalCdf(NaN)]).toEqual([0, 1, NaN]);
  });

  it('gives every name its own numbers, the same for a seed', () => {
    const take = (seed: number, name: string) => {
      const random = randomStreams(seed)(name);
      return [random(), random()];
    };
    expect(take(3, 'gain a')).toEqual(take(3, 'gain a'));
    expect(take(3, 'gain a')).not.toEqual(take(3, 'gain b'));
    expect(take(3, 'gain a')).not.toEqual(take(4, 'gain a'));
  });

  it('finds the time of a level: a square, a step, today, never', () => {
    expect(yearsToLevel((years) => years ** 2, 50, 100)).toBeCloseTo(Math.sqrt(50), 2);
    expect(yearsToLevel((years) => (years < 7.3 ? 0 : 1), 0.5, 100)).toBeCloseTo(7.3, 2);
    expect(yearsToLevel(() => 2, 1, 100)).toBe(0);
    expect(yearsToLevel((years) => years / 1000, 1, 100)).toBe(Infinity);
  });
});

describe('the life of a part', () => {
  it('adds up without any doubt: what was recorded, then the plan at the recorded rate', () => {
    const made = vessel(EVEN, { carriedInHours: 100, unloggedHours: 50 });
    const { paths } = partLife(draw(made, 3), made.part, new Set<Doubt>());
    // 50 days of 5 h were recorded: D in 250 h. Carried in 100 h, unlogged 50 h, then 500 h a year.
    const perHour = made.part.details[0].grid.total[4] / 250;
    const { cumulative, years } = paths[0];
    for (const start of [0, years + 1]) {
      expect(cumulative[start] / perHour).toBeCloseTo(250 + 100 + 50, 6);
      expect((cumulative[start + 3] - cumulative[start]) / perHour).toBeCloseTo(1500, 6);
    }
  });

  it('meets the closed lognormal form (JCSS format) when every day is alike', () => {
    // Single slope 4, no doubt about days: gain 0.05 and stress 0.10 act with their fourth power, scatter of the curve
    // 0.46, Miner sum cov 0.3. ln(damage) has spread hypot(4 * ln sd of each), median exp(-4 * half of the variances).
    const made = vessel(EVEN, { gainCov: 0.05, stressCov: 0.1, curveLnSd: 0.46, minerCov: MINER_COV });
    const life = partLife(draw(made, 4000), made.part, new Set<Doubt>(['gain', 'stress', 'curve', 'miner']));
    const loadLnSd = 4 * Math.hypot(lnSdOfCov(0.05), lnSdOfCov(0.1));
    const perYear = made.part.details[0].grid.total[4] * 2;
    const model = {
      medianDamagePerYear: perYear * Math.exp(-2 * (lnSdOfCov(0.05) ** 2 + lnSdOfCov(0.1) ** 2)),
      medianMinerSum: lognormalMedian(1, MINER_COV),
      totalLnSd: totalLnSd(loadLnSd, 0.46, lnSdOfCov(MINER_COV)),
    };
    // The record itself is half a year of the plan.
    for (const probability of [0.01, 0.05, 0.5]) {
      const closed = yearsToProbability(model, probability) - 0.5;
      // 4,000 draws with the scatter integrated: a few per cent at 1 %.
      expect(Math.abs(yearsToFailureProbability(life, probability, 1e6) / closed - 1)).toBeLessThan(0.05);
      expect(
        Math.abs(failureProbabilityAt(life, closed) - failureProbability(model, closed + 0.5)),
      ).toBeLessThan(0.15 * probability);
    }
  });

  it('repeats for a seed, and no part moves when another is fitted', () => {
    const made = vessel(UNEVEN, { gainCov: 0.1, stressCov: 0.1, seasonCov: 0.3, curveLnSd: 0.5 });
    const other = { ...made.part, key: 'lower-port' };
    const alone = reliabilityDate(partLife(draw(made), made.part), '2026-05-01');
    const shared = draw(made);
    partLife(shared, other);
    expect(reliabilityDate(partLife(shared, made.part), '2026-05-01')).toEqual(alone);
    expect(reliabilityDate(partLife(draw(made, 1000, 2), made.part), '2026-05-01')).not.toEqual(alone);
  });

  it('fails at its first detail: two alike fail more often than one, as their scatter is each its own', () => {
    const one = vessel(EVEN, { curveLnSd: 0.5 });
    const [detail] = one.part.details;
    const two = { ...one.part, details: [detail, { ...detail, key: 'upper-terminal' }] };
    const draws = draw(one, 10);
    const years = yearsToFailureProbability(partLife(draws, one.part), 0.1, 1e5);
    // 1 - 0.9 * 0.9 = 0.19; the time is found to four digits.
    expect(failureProbabilityAt(partLife(draws, two), years)).toBeCloseTo(0.19, 2);
  });

  it('moves earlier with every further doubt', () => {
    const target = 0.01;
    const years = (doubts: Parameters<typeof vessel>[1]): number => {
      const made = vessel(EVEN, { curveLnSd: 0.4, ...doubts });
      return yearsToFailureProbability(partLife(draw(made), made.part), target, 1e6);
    };
    const base = years({});
    expect(years({ gainCov: 0.1 })).toBeLessThan(base);
    expect(years({ stressCov: 0.1 })).toBeLessThan(base);
    expect(years({ seasonCov: 0.3 })).toBeLessThan(base);
    expect(years({ minerCov: 0.3 })).toBeLessThan(base);
    expect(years({ curveLnSd: 0.6 })).toBeLessThan(base);
  });

  it('doubts a rate from six days more than one from fifty', () => {
    const spread = (days: readonly number[]): number => {
      const made = vessel(days, {});
      const fan = forecastFan(draw(made), made.part, '2026-05-01', ['2036-05-01']);
      return Math.log(fan.rows[0].p95 / fan.rows[0].p05);
    };
    expect(spread(UNEVEN.slice(0, 6))).toBeGreaterThan(1.5 * spread(UNEVEN));
  });

  it('keeps rates by wind apart: hours planned as recorded, unlogged gales charged as gales', () => {
    const made = vessel([...new Array<number>(20).fill(3), ...new Array<number>(5).fill(9)]);
    const groups = [0, 1].map((band) => ({ state: 'sailing' as const, band }));
    const use: UseRecord = {
      ...made.use,
      groups,
      days: made.use.days.map((day, index) => ({
        ...day,
        loggedHours: index < 20 ? [5, 0] : [0, 5],
        unloggedHours: [0, 0],
      })),
      otherUnloggedHours: [0, 30],
    };
    const [detail] = made.part.details;
    const part = {
      ...made.part,
      details: [
        { ...detail, shares: detail.shares.map((share) => ({ ...share, group: share.day < 20 ? 0 : 1 })) },
      ],
    };
    const { paths } = partLife(lifeDraws(use, randomStreams(1), { draws: 1 }), part, new Set<Doubt>());
    const ofGale = detail.grid.byDay[20 * GRID_SIZE + 4] / 5;
    // Today: all that was recorded, and 30 h of gale at the gale's own rate.
    expect(paths[0].cumulative[0]).toBeCloseTo(detail.grid.total[4] + 30 * ofGale, 12);
    // The known hours are 100 light and 25 + 30 gale: of 500 planned, 500 * 55 / 155 are gale.
    const light = detail.grid.byDay[4] / 5;
    const perYear = (500 * (100 * light + 55 * ofGale)) / 155;
    expect((paths[0].cumulative[1] - paths[0].cumulative[0]) / perYear).toBeCloseTo(1, 9);
  });

  it('does not take days in harbour for calm weather at sea', () => {
    const sea = vessel(UNEVEN);
    // The same days at sea with two days at rest before each of them.
    const harbour: UseRecord = {
      ...sea.use,
      groups: [...sea.use.groups, { state: 'at-rest-afloat', band: null }],
      days: sea.use.days.flatMap((day) => [
        { season: 0, loggedHours: [0, 24], unloggedHours: [0, 0] },
        { season: 0, loggedHours: [0, 24], unloggedHours: [0, 0] },
        { ...day, loggedHours: [5, 19], unloggedHours: [0, 0] },
      ]),
    };
    const [detail] = sea.part.details;
    const byDay = new Float64Array(detail.grid.byDay.length * 3);
    for (let day = 0; day < UNEVEN.length; day++) {
      byDay.set(
        detail.grid.byDay.subarray(day * GRID_SIZE, (day + 1) * GRID_SIZE),
        (3 * day + 2) * GRID_SIZE,
      );
    }
    const inHarbour = {
      ...detail,
      grid: { ...detail.grid, byDay },
      shares: detail.shares.map((share) => ({ ...share, day: 3 * share.day + 2 })),
      calibrationOfDay: harbour.days.map(() => 0),
    };
    const fanOf = (use: UseRecord, part: PartRecord) => {
      const [row] = forecastFan(lifeDraws(use, randomStreams(1), { draws: 4000 }), part, '2026-05-01', [
        '2031-05-01',
      ]).rows;
      return { median: row.median, spread: Math.log(row.p95 / row.p05) };
    };
    const atSea = fanOf(sea.use, sea.part);
    const mixed = fanOf(harbour, { ...sea.part, details: [inHarbour] });
    expect(Math.abs(mixed.median / atSea.median - 1)).toBeLessThan(0.05);
    // Three times as many days make longer blocks, no wilder weather.
    expect(mixed.spread / atSea.spread).toBeLessThan(1.3);
  });

  it('says which unlogged hours no record answers for', () => {
    const made = vessel(EVEN);
    const groups = [4, 5, null].map((band) => ({ state: 'sailing' as const, band }));
    const use: UseRecord = {
      ...made.use,
      groups: [...groups, { state: 'mast-out', band: null }],
      days: made.use.days.map(() => ({
        season: 0,
        loggedHours: [5, 0, 0, 0],
        unloggedHours: [0, 0.5, 1, 2],
      })),
      otherUnloggedHours: [0, 3, 0, 0],
    };
    // Fifty days of half an hour and three more in a band above all records; unknown wind is answered by all of sailing.
    expect(notCoveredHours(use)).toEqual([{ state: 'sailing', band: 5, hours: 28 }]);
  });

  it('gives each calibration period its own gain', () => {
    const made = vessel(EVEN, { gainCov: 0.1 });
    const use: UseRecord = {
      ...made.use,
      calibrations: [
        { key: 'first', gainCov: 0.1 },
        { key: 'second', gainCov: 0.1 },
      ],
    };
    const [detail] = made.part.details;
    const spreadWith = (calibrationOfDay: number[]): number => {
      const part = { ...made.part, details: [{ ...detail, calibrationOfDay }] };
      const { paths } = partLife(
        lifeDraws(use, randomStreams(1), { draws: 4000 }),
        part,
        new Set<Doubt>(['gain']),
      );
      const logs = Array.from({ length: 4000 }, (_, i) =>
        Math.log(paths[0].cumulative[i * (paths[0].years + 1)]),
      );
      const mean = logs.reduce((sum, value) => sum + value, 0) / logs.length;
      return Math.sqrt(logs.reduce((sum, value) => sum + (value - mean) ** 2, 0) / logs.length);
    };
    // One period: 4 * 0.09975 = 0.399. Two independent halves: near 0.399 / sqrt(2) = 0.282, a little more for large gains.
    expect(spreadWith(EVEN.map(() => 0))).toBeCloseTo(0.399, 1);
    const two = spreadWith(EVEN.map((_, day) => (day < 25 ? 0 : 1)));
    expect(two).toBeGreaterThan(0.26);
    expect(two).toBeLessThan(0.32);
  });

  it('refuses a record that does not fit together', () => {
    const made = vessel(EVEN);
    const [detail] = made.part.details;
    const draws = draw(made, 2);
    const broken = (change: object): PartRecord => ({ ...made.part, details: [{ ...detail, ...change }] });
    expect(() => partLife(draws, broken({ calibrationOfDay: [0] }))).toThrow(RangeError);
    expect(() => partLife(draws, broken({ calibrationOfDay: EVEN.map(() => 4) }))).toThrow(RangeError);
    const noLoads = { ...made.use, days: [{ season: 0, loggedHours: [0], unloggedHours: [5] }] };
    expect(() => lifeDraws(noLoads, randomStreams(1))).toThrow(RangeError);
  });
});

describe('the record of a detail', () => {
  const curve = (level: ReferenceCurve['level'], sdLog10N: number | null): ReferenceCurve => ({
    id: 'invented',
    version: 1,
    name: 'Invented',
    appliesTo: 'nothing',
    measure: 'stress-metallic',
    level,
    k: 2,
    sdLog10N,
    environment: 'air',
    segments: ONE_SLOPE.segments,
    meanLoad: { kind: 'none', reason: 'measured under tension' },
    thickness: null,
    threadSize: null,
    cutOffRange: null,
    validity: { minRange: null, maxRange: null, note: '' },
    source: 'made for this test',
    provenance: 'derived',
    provenanceNote: '',
    analogyNote: '',
    selectable: false,
  });
  const recordOf = (own: ReferenceCurve, modelSdLog10N = 0) =>
    detailRecord({
      key: 'wire',
      name: 'free length',
      model: { ...detailOn(ONE_SLOPE), curve: own },
      modelSdLog10N,
      designFatigueFactor: 3,
      spectrum: spectrumOfDays(UNEVEN),
      dayNumbers: UNEVEN.map((_, day) => day),
      gainCov: 0.1,
      basisCov: 0.15,
    });
  const design = damageOfSpectrum(spectrumOfDays(UNEVEN), detailOn(ONE_SLOPE)).damage;

  it('stands on the mean curve, and finds the design damage again (two deviations of 0.20: 2.511886)', () => {
    const record = recordOf(curve('mean-minus-k-sd', 0.2));
    expect(record.designOverMean).toBeCloseTo(2.511886, 6);
    expect(record.grid.total[4] * record.designOverMean).toBeCloseTo(design, 12);
  });

  it('is never shifted by doubt about its fit, nor where its level is not known', () => {
    const borrowed = recordOf(curve('mean-minus-k-sd', 0.2), 0.25);
    expect(borrowed.grid.total).toEqual(recordOf(curve('mean-minus-k-sd', 0.2)).grid.total);
    expect(borrowed.curveLnSd).toBeCloseTo(0.7372, 4);
    const unknown = recordOf(curve('unknown', 0.2));
    expect(unknown.designOverMean).toBe(1);
    expect(unknown.grid.total[4]).toBeCloseTo(design, 12);
    // Without a published scatter 0.25 is taken: 10^0.5.
    expect(recordOf(curve('fractile-95-75', null)).designOverMean).toBeCloseTo(Math.sqrt(10), 9);
  });
});

describe('dates', () => {
  const asOfOn = '2026-05-01';
  const made = vessel(UNEVEN, {
    gainCov: 0.1,
    stressCov: 0.1,
    seasonCov: 0.3,
    curveLnSd: 0.5,
    minerCov: 0.3,
  });
  const draws = draw(made);
  const life = partLife(draws, made.part);

  it('names the day the probability reaches its target, and that is its probability on that day', () => {
    const { replaceByOn, target, evenOddsOn, overdue } = reliabilityDate(life, asOfOn);
    expect(target).toBe(0.01);
    expect(overdue).toBe(false);
    const [row] = failureProbabilityByDate(life, asOfOn, [replaceByOn ?? '']);
    expect(Math.abs(row.probability - 0.01)).toBeLessThan(1e-4);
    expect(row.ifSoundToday).toBeLessThan(row.probability);
    expect(evenOddsOn === null || evenOddsOn > (replaceByOn ?? '')).toBe(true);
    expect(reliabilityDate(life, asOfOn, 0.05).remainingYears).toBeGreaterThan(
      reliabilityDate(life, asOfOn, 0.01).remainingYears,
    );
  });

  it('is overdue where the target was passed before today', () => {
    const worn = vessel(UNEVEN, { curveLnSd: 0.5, carriedInHours: 1e7 });
    const date = reliabilityDate(partLife(draw(worn, 50), worn.part), asOfOn);
    expect(date).toMatchObject({ overdue: true, remainingYears: 0, replaceByOn: asOfOn });
  });

  it('takes the earlier of rule date and reliability date, keeping both', () => {
    const [detail] = made.part.details;
    const rule = (dff: number) =>
      ruleDate({
        asOfOn,
        damage: detail.grid.total[4] * detail.designOverMean,
        dff,
        designDamagePerSailingHour: (detail.grid.total[4] * detail.designOverMean) / 250,
        plannedHoursPerYear: 500,
      });
    const reliability = reliabilityDate(life, asOfOn);
    const early = fatigueReplaceBy(rule(1000), reliability);
    expect(early).toMatchObject({ governs: 'rule', replaceByOn: early.rule.replaceByOn });
    const late = fatigueReplaceBy(rule(1), reliability);
    expect(late).toMatchObject({ governs: 'reliability', replaceByOn: reliability.replaceByOn });
  });

  it('has a fan about the rule line that holds neither stress nor scatter of the curve', () => {
    const fan = forecastFan(draws, made.part, asOfOn, ['2026-05-01', '2031-05-01', '2036-05-01']);
    for (const row of fan.rows) {
      expect(row.p05).toBeLessThanOrEqual(row.p25);
      expect(row.p25).toBeLessThanOrEqual(row.median);
      expect(row.median).toBeLessThanOrEqual(row.p75);
      expect(row.p75).toBeLessThanOrEqual(row.p95);
    }
    const louder = vessel(UNEVEN, {
      gainCov: 0.1,
      stressCov: 0.1,
      seasonCov: 0.3,
      curveLnSd: 2,
      minerCov: 0.9,
    });
    const same = forecastFan(draw(louder), louder.part, asOfOn, ['2026-05-01', '2031-05-01', '2036-05-01']);
    expect(same).toEqual(fan);
    expect(fan.remainingYears.p05).toBeLessThan(fan.remainingYears.p95);
  });

  it('puts the chance of a vessel between that of its worst part and the sum of all', () => {
    const second = { ...made.part, key: 'cap-stbd' };
    const lives = [life, partLife(draws, second)];
    const on = '2040-05-01';
    const single = lives.map((one) => failureProbabilityByDate(one, asOfOn, [on])[0].probability);
    const [row] = vesselFailureProbability(lives, asOfOn, [on]);
    expect(row.probability).toBeGreaterThan(Math.max(...single));
    expect(row.probability).toBeLessThan(single[0] + single[1]);
    // Loads shared by both parts make failing together likelier than chance: any < 1 - product of holding.
    expect(row.probability).toBeLessThan(1 - (1 - single[0]) * (1 - single[1]));
    expect(() => vesselFailureProbability([life, partLife(draw(made), second)], asOfOn, [on])).toThrow(
      RangeError,
    );
  });

  it('answers when the season falls: no winter use, no winter damage', () => {
    const profile = { cumulative: [0, 0.2, 0.5, 0.8, 1, 1, 1, 1, 1, 1, 1, 1, 1] };
    const summer = { ...made, use: { ...made.use, yearProfile: profile } };
    const days = ['2026-05-01', '2026-09-15', '2027-04-25', '2027-05-02'];
    const rows = forecastFan(draw(summer, 50), summer.part, asOfOn, days).rows;
    expect(rows[2].median).toBeCloseTo(rows[1].median, 12);
    expect(rows[1].median).toBeGreaterThan(rows[0].median);
  });
});

describe('what makes a date doubtful', () => {
  it('shares the spread as the squares of its parts (hand: 4 * 0.0998 twice, 0.5)', () => {
    const made = vessel(EVEN, { gainCov: 0.1, stressCov: 0.1, curveLnSd: 0.5 });
    const shares = spreadShares(draw(made, 4000), made.part, 20);
    const of = (doubt: Doubt) => shares.find((row) => row.doubt === doubt)?.share ?? 0;
    // ln sd of cov 0.1 is 0.09975; times slope 4 0.399; squares 0.1592, 0.1592 and 0.25 of 0.5684.
    expect(of('gain')).toBeCloseTo(0.28, 1);
    expect(of('stress')).toBeCloseTo(0.28, 1);
    expect(of('curve')).toBeCloseTo(0.44, 1);
    expect(shares.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(1, 12);
    expect(shares.map(({ doubt }) => doubt)).not.toContain('seasons');
  });

  it('ranks what would narrow it, leaving out what nobody can mend', () => {
    const made = vessel(UNEVEN, { gainCov: 0.1, stressCov: 0.05, seasonCov: 0.1, curveLnSd: 0.4 });
    const rows = whatWouldNarrow(draw(made), made.part, [
      { input: 'articulation', words: 'How the lower end turns.', confirmed: false, remainingYears: [1, 9] },
      { input: 'pin', words: 'The pin.', confirmed: true, remainingYears: [0, 50] },
    ]);
    // Nine years less one are 96 months.
    expect(rows.find(({ key }) => key === 'articulation')?.months).toBeCloseTo(96, 9);
    const months = rows.map((row) => row.months);
    expect(months).toEqual([...months].sort((one, other) => other - one));
    const keys = rows.map(({ key }) => key);
    expect(keys).not.toContain('pin');
    expect(keys).not.toContain('curve');
    const gain = rows.find(({ key }) => key === 'gain')?.months ?? 0;
    expect(gain).toBeGreaterThan(rows.find(({ key }) => key === 'seasons')?.months ?? 0);
  });

  it('calls a date provisional while one unconfirmed input moves it by more than three', () => {
    const estimate = (remainingYears: readonly [number, number], confirmed = false) => ({
      input: 'articulation',
      words: 'How the lower end turns.',
      confirmed,
      remainingYears,
    });
    expect(provisionalRange(6, [estimate([2, 18])])).toMatchObject({
      provisional: false,
      fromYears: 6,
      toYears: 6,
    });
    expect(provisionalRange(6, [estimate([1.9, 7])])).toMatchObject({
      provisional: true,
      fromYears: 1.9,
      toYears: 7,
    });
    expect(provisionalRange(6, [estimate([0, 6])]).causes[0].factor).toBe(Infinity);
    expect(provisionalRange(6, [estimate([1, 60], true)]).provisional).toBe(false);
    expect(provisionalRange(0, [estimate([0, 0])]).provisional).toBe(false);
    expect(() => provisionalRange(-1, [])).toThrow(RangeError);
  });

  it('knows the usual figures (JCSS part 3 for the stress model; the others are estimates)', () => {
    expect([stressModelCov(1), stressModelCov(2.5)]).toEqual([0.1, 0.2]);
    expect([basisCov('measured'), basisCov('in-line'), basisCov('mirrored')]).toEqual([0, 0, 0.15]);
    expect(() => basisCov('none')).toThrow(RangeError);
    expect([targetProbability(true), targetProbability(false)]).toEqual([0.01, 0.05]);
    expect(['fixed-itinerary', 'ordinary', 'charter'].map((kind) => seasonCov(kind as 'charter'))).toEqual([
      0.2, 0.3, 0.5,
    ]);
    // 0.20 and 0.25 together: 0.3202 in log10, 0.7372 in ln.
    expect(curveLnSd({ sdLog10N: 0.2 }, 0.25)).toBeCloseTo(0.7372, 4);
    expect(curveLnSd({ sdLog10N: null }, 0)).toBeCloseTo(0.25 * Math.LN10, 12);
  });

  it('doubts a load cell by 10 % without a calibration in 24 months', () => {
    expect(gainDoubt(null, '2026-05-01').cov).toBe(0.1);
    expect(gainDoubt({ calibratedOn: '2024-05-01', cov: 0.02 }, '2026-05-01').cov).toBe(0.02);
    expect(gainDoubt({ calibratedOn: '2024-05-01', cov: 0.02 }, '2026-05-02').cov).toBe(0.1);
    expect(gainDoubt({ calibratedOn: '2026-01-01', cov: null }, '2026-05-01').cov).toBe(0.03);
    expect(() => gainDoubt({ calibratedOn: '2026-01-01', cov: -1 }, '2026-05-01')).toThrow(RangeError);
  });
});

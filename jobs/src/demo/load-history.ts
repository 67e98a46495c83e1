import { SailingWeather, type Conditions } from './sailing-weather.js';
import type { SeededRandom } from './seeded-random.js';

/** How a sensor's part answers to wind, heel and sea. Invented figures in the size such rigs see. */
export interface ChannelModel {
  column: string;
  /** On a side, a part is loaded when it is to windward; on the centre line always. */
  side: 'port' | 'starboard' | 'centre';
  /** Load at rest in harbour, kN. */
  dockKn: number;
  /** Load added at 20 knots apparent wind when it carries the sails, kN. */
  at20KnotsKn: number;
  /** Load added per metre the sea lifts the hull, kN. */
  perMetreKn: number;
}

/** One outing: when, in what weather, for how long. */
export interface Outing {
  startMs: number;
  hours: number;
  conditions: Conditions;
}

export interface HistoryRow {
  timeMs: number;
  windKn: number;
  /** kN, in the order of the channels. */
  loads: readonly number[];
}

/** Above this wind a crew has shortened sail, so that loads grow no further with its square. */
const REEFING_KNOTS = 23;
const TACK_S = 14;
/** Of the wave-frequency load, what a leeward part still feels. */
const LEEWARD_SHARE = 0.25;
const SLAMS_PER_HOUR = 5;
const REST_AT_ENDS_S = 300;

/**
 * Loads of a sailing rig through one outing: quiet at the ends, legs on alternating tacks, gusts and sea between, the
 * flogging of each tack, and now and then a slam. An invention for demonstration and tests, with no claim on physics.
 */
export function* loadHistory(
  channels: readonly ChannelModel[],
  outing: Outing,
  rateHz: number,
  random: SeededRandom,
): Generator<HistoryRow> {
  const weather = new SailingWeather(outing.conditions, random);
  const dtS = 1 / rateHz;
  const rows = Math.floor(outing.hours * 3600 * rateHz);
  let windward: 'port' | 'starboard' = random.uniform() < 0.5 ? 'port' : 'starboard';
  let nextTackS = REST_AT_ENDS_S + random.between(600, 4200);
  let tackedAtS = -Infinity;
  let slamKn = 0;

  for (let row = 0; row < rows; row++) {
    const timeS = row * dtS;
    const { windKn, surfaceM } = weather.step(timeS, dtS);
    if (timeS >= nextTackS) {
      windward = windward === 'port' ? 'starboard' : 'port';
      tackedAtS = timeS;
      nextTackS = timeS + random.between(900, 5400);
    }
    const sinceTackS = timeS - tackedAtS;
    const settled = Math.min(1, sinceTackS / TACK_S);
    const flogging = settled < 1 ? 0.35 * (1 - settled) * random.normal() : 0;
    slamKn *= Math.exp(-dtS / 1.5);
    if (random.uniform() < (SLAMS_PER_HOUR / 3600) * dtS) {
      slamKn += random.between(0.15, 0.6) * Math.max(outing.conditions.waveHeightM, 0.2);
    }
    const underWay = Math.min(
      1,
      Math.max(0, Math.min(timeS, outing.hours * 3600 - timeS) / REST_AT_ENDS_S - 1),
    );
    const drive =
      Math.min(windKn, REEFING_KNOTS) ** 2 / 20 ** 2 + 0.012 * Math.max(0, windKn - REEFING_KNOTS);

    const loads = channels.map((channel) => {
      const carries = shareOf(channel.side, windward, settled);
      const steady = channel.at20KnotsKn * drive * carries;
      const alive = LEEWARD_SHARE + (1 - LEEWARD_SHARE) * Math.max(0, carries);
      const sea = channel.perMetreKn * (surfaceM + slamKn) * alive;
      const load = channel.dockKn + underWay * (steady + sea + flogging * channel.at20KnotsKn * alive);
      return Math.max(0, load + 0.004 * channel.dockKn * random.normal());
    });
    yield { timeMs: outing.startMs + Math.round(timeS * 1000), windKn, loads };
  }
}

/** 1: carries the sails; below 0: slackened to leeward. Through a tack the load changes over in a few seconds. */
function shareOf(side: ChannelModel['side'], windward: 'port' | 'starboard', settled: number): number {
  if (side === 'centre') return 0.55 + 0.45 * settled;
  const now = side === windward ? 1 : -0.3;
  const before = side === windward ? -0.3 : 1;
  return before + (now - before) * settled;
}

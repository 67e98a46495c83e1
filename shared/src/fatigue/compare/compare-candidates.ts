import type { ReferenceCurve } from '../curves/curve.js';
import type { DetailModel } from '../damage/detail-model.js';
import { lnSdOfCov } from '../statistics/lognormal.js';
import { normalSource } from '../statistics/normal-source.js';
import { quantileOfSorted } from '../statistics/quantile-of-sorted.js';
import type { RandomStreams } from '../statistics/random-streams.js';
import { curveLnSd } from '../uncertainty/curve-ln-sd.js';
import { damageOnGrid } from '../uncertainty/damage-on-grid.js';
import { lnFactors } from '../uncertainty/life-draws.js';
import { MINER_COV } from '../uncertainty/life-record.js';
import { meanDetail } from '../uncertainty/mean-detail.js';
import { stressModelCov } from '../uncertainty/stress-model-cov.js';
import type { CompareHistory } from './compare-history.js';
import { historyDamage } from './history-damage.js';
import { type LoadShare, loadShare } from './load-share.js';

/** A place on a candidate that can fail by itself. */
export interface CandidateDetail {
  name: string;
  model: Omit<DetailModel, 'curve'> & { curve: ReferenceCurve };
  /** Doubt about a borrowed curve, standard deviation of log10 N. */
  modelSdLog10N: number;
}

/** A material and size for a part, made up as it would be fitted. */
export interface Candidate {
  id: string;
  name: string;
  kindOfWire: 'strand' | 'rod' | 'fibre';
  /** All details of the assembly that can be assessed, terminals included; none for fibre. */
  details: readonly CandidateDetail[];
  /** Details that cannot be assessed, by name. */
  notAssessedDetails: readonly string[];
  /** Breaking load of the assembly, kN; null where it is not known. */
  breakingLoadKn: number | null;
  /** Stiffness E * A, kN. */
  stiffnessKn: number;
  massKgPerM: number;
  /** Cost of part and work, in minor units of the firm's currency; null where there is no price. */
  costMinor: number | null;
  /** Years after which its material is replaced by the calendar; null where the trade names none. */
  calendarYears: number | null;
}

/** What all candidates are tried on. */
export interface CompareSetting {
  history: CompareHistory;
  plannedHoursPerYear: number;
  /** Doubt about the recorded loads, coefficient of variation; drawn once for all candidates. */
  gainCov: number;
  lengthM: number;
  /** Height of the middle of the stay above deck, m. */
  middleHeightM: number;
  /** Load the stretch is stated at, kN. */
  stretchLoadKn: number;
  /** Stiffness of the part the loads were recorded on, kN. */
  recordedStiffnessKn: number;
  /** Of the parallel load paths beside it, kN; null: not known. */
  parallelStiffnessKn: number | null;
  /** Tune target, kN: it stays, whatever the material. */
  dockKn: number;
  /** Probability of having failed at which such a part is replaced. */
  targetProbability: number;
}

/** A candidate on the sheet. Null stands for "not to be stated", never for zero. */
export interface ComparedCandidate {
  id: string;
  name: string;
  /**
   * By the first detail to fail in each draw, at the planned hours and the recorded damage per hour; null for fibre and
   * where nothing is assessed. Doubts about use, which all candidates share, are not in it.
   */
  lifeYears: { p05: number; median: number; p95: number } | null;
  /** Years until the target probability, by which it would be planned. */
  planningYears: number | null;
  /** Detail that fails first in most draws. */
  governingDetail: string | null;
  notAssessedDetails: readonly string[];
  /** Details whose curve has an unknown level and could not be shifted to the mean. */
  unknownLevel: string[];
  calendarYears: number | null;
  /** Assembly's breaking load over the highest load. */
  strengthMargin: number | null;
  stretchMm: number;
  massKg: number;
  /** Mass times height of its middle, kg m. */
  weightAloftKgM: number;
  /** Over the shorter of planning years and calendar years. */
  costPerYearMinor: number | null;
  share: LoadShare;
  words: string | null;
}

/** Two candidates against each other. */
export interface PairVerdict {
  oneId: string;
  otherId: string;
  /** Share of the draws in which the first lasts longer. */
  oneLongerShare: number;
  verdict: 'one-longer' | 'other-longer' | 'not-separated';
  words: string;
}

export interface Comparison {
  candidates: ComparedCandidate[];
  /** Every pair of candidates that have a life, in their order. */
  pairs: PairVerdict[];
}

/** Between these shares of the draws the data do not separate two candidates. Engineering choice. */
const SEPARATED_BELOW = 0.2;
const SEPARATED_ABOVE = 0.8;
const FIBRE_WORDS = 'Fibre has no fatigue figure: no usable curve exists. Its calendar is shown.';

/**
 * Tries candidates on one and the same load history: all on their mean curves with their own spread, each by the first
 * detail of its whole assembly to fail. What they share (the doubt about the loads) is drawn once for all; scatter of
 * curves, stress models and Miner sums is drawn for each. Fibre shows its clock only.
 *
 * @param streams source of random numbers; a candidate's numbers go by its id, so that another candidate never moves it
 * @param draws 2,000 unless given
 * @throws RangeError for planned hours, length or load that are not above zero
 */
export function compareCandidates(
  candidates: readonly Candidate[],
  setting: CompareSetting,
  streams: RandomStreams,
  draws = 2000,
): Comparison {
  for (const [name, value] of Object.entries({
    plannedHoursPerYear: setting.plannedHoursPerYear,
    lengthM: setting.lengthM,
    stretchLoadKn: setting.stretchLoadKn,
  })) {
    if (!(value > 0)) throw new RangeError(`${name} must be above zero, not ${value}.`);
  }
  const lnGain = lnFactors(draws, setting.gainCov, streams('gain'));
  const lives = candidates.map((candidate) => livesOf(candidate, setting, lnGain, streams));
  return {
    candidates: candidates.map((candidate, i) => onTheSheet(candidate, setting, lives[i])),
    pairs: pairVerdicts(candidates, lives),
  };
}

interface CandidateLives {
  share: LoadShare;
  years: Float64Array;
  firstToFail: Uint16Array;
}

function livesOf(
  candidate: Candidate,
  setting: CompareSetting,
  lnGain: Float64Array,
  streams: RandomStreams,
): CandidateLives | null {
  const share = loadShare(setting.recordedStiffnessKn, candidate.stiffnessKn, setting.parallelStiffnessKn);
  if (candidate.kindOfWire === 'fibre' || candidate.details.length === 0) return null;
  const { history, plannedHoursPerYear, gainCov } = setting;
  const draws = lnGain.length;
  const years = new Float64Array(draws).fill(Infinity);
  const firstToFail = new Uint16Array(draws);
  const lnMiner = lnFactors(draws, MINER_COV, streams(`miner ${candidate.id}`));
  candidate.details.forEach(({ name, model, modelSdLog10N }, index) => {
    const stressCov = stressModelCov(model.stressConcentration);
    const lnSd = Math.hypot(lnSdOfCov(gainCov), lnSdOfCov(stressCov));
    const { total, lnStep, rangePerGain } = historyDamage(history, meanDetail(model), share.loadFactor, lnSd);
    const lnStress = lnFactors(draws, stressCov, streams(`stress ${candidate.id}/${name}`));
    const scatter = curveLnSd(model.curve, modelSdLog10N);
    const normal = normalSource(streams(`curve ${candidate.id}/${name}`));
    for (let i = 0; i < draws; i++) {
      const damage = damageOnGrid(total, 0, lnStep, rangePerGain * lnGain[i] + lnStress[i]);
      const perYear = (damage / history.hours) * plannedHoursPerYear;
      const life = Math.exp(lnMiner[i] + scatter * normal()) / perYear;
      if (life < years[i]) {
        years[i] = life;
        firstToFail[i] = index;
      }
    }
  });
  return { share, years, firstToFail };
}

function onTheSheet(
  candidate: Candidate,
  setting: CompareSetting,
  lives: CandidateLives | null,
): ComparedCandidate {
  const { lengthM, middleHeightM, stretchLoadKn, history, dockKn } = setting;
  const share =
    lives?.share ??
    loadShare(setting.recordedStiffnessKn, candidate.stiffnessKn, setting.parallelStiffnessKn);
  const sorted = lives === null ? null : Float64Array.from(lives.years).sort();
  const planningYears = sorted === null ? null : quantileOfSorted(sorted, setting.targetProbability);
  const lasts = Math.min(planningYears ?? Infinity, candidate.calendarYears ?? Infinity);
  const highestKn = dockKn + Math.max(history.highestKn - dockKn, 0) * share.loadFactor;
  const massKg = candidate.massKgPerM * lengthM;
  return {
    id: candidate.id,
    name: candidate.name,
    lifeYears:
      sorted === null
        ? null
        : {
            p05: quantileOfSorted(sorted, 0.05),
            median: quantileOfSorted(sorted, 0.5),
            p95: quantileOfSorted(sorted, 0.95),
          },
    planningYears,
    governingDetail: lives === null ? null : mostOften(lives.firstToFail, candidate),
    notAssessedDetails: candidate.notAssessedDetails,
    unknownLevel: candidate.details
      .filter(({ model }) => model.curve.level === 'unknown')
      .map(({ name }) => name),
    calendarYears: candidate.calendarYears,
    strengthMargin:
      candidate.breakingLoadKn === null || highestKn === 0 ? null : candidate.breakingLoadKn / highestKn,
    stretchMm: (stretchLoadKn * lengthM * 1000) / candidate.stiffnessKn,
    massKg,
    weightAloftKgM: massKg * middleHeightM,
    costPerYearMinor:
      candidate.costMinor === null || !Number.isFinite(lasts) || lasts <= 0
        ? null
        : Math.round(candidate.costMinor / lasts),
    share,
    words:
      candidate.kindOfWire === 'fibre'
        ? FIBRE_WORDS
        : lives === null
          ? 'No detail of it has a usable curve.'
          : null,
  };
}

function mostOften(firstToFail: Uint16Array, candidate: Candidate): string {
  const times = new Array<number>(candidate.details.length).fill(0);
  for (const index of firstToFail) times[index]++;
  return candidate.details[times.indexOf(Math.max(...times))].name;
}

function pairVerdicts(
  candidates: readonly Candidate[],
  lives: readonly (CandidateLives | null)[],
): PairVerdict[] {
  const pairs: PairVerdict[] = [];
  for (let a = 0; a < lives.length; a++) {
    for (let b = a + 1; b < lives.length; b++) {
      const one = lives[a];
      const other = lives[b];
      if (one !== null && other !== null) pairs.push(verdictOf(candidates[a], candidates[b], one, other));
    }
  }
  return pairs;
}

function verdictOf(
  one: Candidate,
  other: Candidate,
  ofOne: CandidateLives,
  ofOther: CandidateLives,
): PairVerdict {
  let longer = 0;
  for (let i = 0; i < ofOne.years.length; i++) {
    if (ofOne.years[i] > ofOther.years[i]) longer++;
    // Two that never fail, or fail together, are a draw.
    else if (ofOne.years[i] === ofOther.years[i]) longer += 0.5;
  }
  const share = longer / ofOne.years.length;
  const base = { oneId: one.id, otherId: other.id, oneLongerShare: share };
  if (share >= SEPARATED_BELOW && share <= SEPARATED_ABOVE) {
    return {
      ...base,
      verdict: 'not-separated',
      words: `These data do not separate them: ${one.name} lasts longer in ${percent(share)} of the draws.`,
    };
  }
  const oneWins = share > SEPARATED_ABOVE;
  return {
    ...base,
    verdict: oneWins ? 'one-longer' : 'other-longer',
    words: `${oneWins ? one.name : other.name} lasts longer in ${percent(oneWins ? share : 1 - share)} of the draws.`,
  };
}

function percent(share: number): string {
  return `${Math.round(share * 100)} %`;
}

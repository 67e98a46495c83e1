import type { WorkingStepDto } from '@stayledger/shared/contracts/life';
import { cyclesToFailure } from '@stayledger/shared/fatigue/curves/cycles-to-failure';
import { CycleEvaluator } from '@stayledger/shared/fatigue/damage/cycle-evaluator';
import { endBendingRangeMpa } from '@stayledger/shared/fatigue/damage/end-bending-range';
import { workingCurve } from '@stayledger/shared/fatigue/damage/working-curve';
import { dayOfNumber } from '@stayledger/shared/fatigue/life/days';
import type { LoadSpectrum } from '@stayledger/shared/fatigue/rainflow/load-spectrum';
import type { AssessedDetail } from './detail-models.js';

/** A cycle of the history, with how often it was counted. */
interface CountedCycle {
  lowKn: number;
  highKn: number;
  count: number;
  day: number;
  damage: number;
  /** The low is the slack part before its first log, not a recorded load. */
  fromSlack: boolean;
}

/** What the working is shown for. */
export interface WorkingInput {
  assessed: AssessedDetail;
  /** The whole history of the part. */
  spectrum: LoadSpectrum;
  damage: number;
  loggedHours: number;
  plannedHoursPerYear: number | null;
  remainingYears: number | null;
  /** Name of the log that was recorded on a day number. */
  logNameOn: (day: number) => string;
  /** Unit of the curve's measure. */
  measureUnit: string;
}

const ASTM = 'ASTM E1049-85, section 5.4.4 (rainflow counting)';
const MINER = 'Palmgren-Miner sum';

/**
 * The way from a recorded load to the date, with the numbers of this part: the cycle that did most damage is followed
 * through the curve, then the sum, the allowance and the remaining time. Empty for a history without damage.
 */
export function workingOf(input: WorkingInput): WorkingStepDto[] {
  const cycle = mostDamagingCycle(input.spectrum, new CycleEvaluator(input.assessed.model));
  if (cycle === null) return [];
  return [
    ...cycleSteps(input, cycle),
    ...sumSteps(input),
    ...(input.plannedHoursPerYear === null || input.remainingYears === null
      ? []
      : [remainingStep(input, input.plannedHoursPerYear, input.remainingYears)]),
  ];
}

function cycleSteps(input: WorkingInput, cycle: CountedCycle): WorkingStepDto[] {
  const { model, curve, detail } = input.assessed;
  const evaluator = new CycleEvaluator(model);
  const range = evaluator.rangeOf(cycle.lowKn, cycle.highKn);
  const perCycle = evaluator.damageOf(range, cycle.lowKn, cycle.highKn);
  const log = input.logNameOn(cycle.day);
  const day = cycle.day === 0 ? log : `${log}, ${dayOfNumber(cycle.day)}`;
  const curveName = `${curve.name}, version ${curve.version}`;
  return [
    {
      title: 'A cycle of the recorded load: the one that used most of the allowance',
      equation: 'dF = F_high - F_low',
      inputs: [
        value('F_high', 'load at the crest of the cycle', cycle.highKn, 'kN', day),
        value(
          'F_low',
          'load at its trough',
          cycle.lowKn,
          'kN',
          cycle.fromSlack ? 'the slack part, before its first log' : day,
        ),
      ],
      result: { symbol: 'dF', value: cycle.highKn - cycle.lowKn, unit: 'kN' },
      source: ASTM,
    },
    stressStep(input, cycle, range),
    {
      title: 'Cycles of this range the curve allows',
      equation: 'N = 10^a * S^-m / divisor',
      inputs: [
        ...segmentInputs(input, range, curveName),
        value('S', 'range', range, input.measureUnit, 'the step before'),
      ],
      result: { symbol: 'N', value: perCycle > 0 ? 1 / perCycle : null, unit: 'cycles' },
      source: curve.source,
    },
    {
      title: 'Damage of these cycles',
      equation: 'D_i = n / N',
      inputs: [
        value('n', 'times this cycle was counted', cycle.count, 'cycles', 'the load spectrum of the part'),
        value(
          'N',
          'cycles the curve allows',
          perCycle > 0 ? 1 / perCycle : 0,
          'cycles',
          `the curve of the ${detail.name}`,
        ),
      ],
      result: { symbol: 'D_i', value: cycle.damage, unit: '' },
      source: MINER,
    },
  ];
}

function stressStep(input: WorkingInput, cycle: CountedCycle, range: number): WorkingStepDto {
  const { model, detail } = input.assessed;
  const inputs = [
    value('dF', 'load range', cycle.highKn - cycle.lowKn, 'kN', 'the step before'),
    value(
      'f',
      'measure of the curve per kN',
      model.factor,
      `${input.measureUnit} per kN`,
      `the ${detail.name}`,
    ),
    value('K', 'stress concentration', model.stressConcentration, '', `the ${detail.name}`),
    value('k_s', 'factor for size', model.sizeFactor, '', `the ${detail.name}`),
  ];
  const bending = model.endBending;
  if (bending !== null) {
    const added = endBendingRangeMpa(model.factor * cycle.lowKn, model.factor * cycle.highKn, bending);
    inputs.push(
      value('S_b', 'range added by bending at the fixed end', added, input.measureUnit, `the ${detail.name}`),
    );
  }
  return {
    title: 'From load to the measure of the curve',
    equation: bending === null ? 'S = dF * f * K * k_s' : 'S = (dF * f * K + S_b) * k_s',
    inputs,
    result: { symbol: 'S', value: range, unit: input.measureUnit },
    source: detail.explanation,
  };
}

function segmentInputs(input: WorkingInput, range: number, curveName: string): WorkingStepDto['inputs'] {
  const { model } = input.assessed;
  // The divisor is shown by itself, so the segment is taken before it is divided into the curve.
  const { segments } = workingCurve({ ...model, lifeDivisor: 1 });
  const segment = segments.find(({ above }) => above <= range);
  if (!segment) return [];
  return [
    value('a', 'intercept of the curve, base-10 logarithm', segment.log10a, '', curveName),
    value('m', 'slope of the curve', segment.m, '', curveName),
    value(
      'divisor',
      'of the life, for the surroundings',
      model.lifeDivisor,
      '',
      `the ${input.assessed.detail.name}`,
    ),
  ];
}

function sumSteps({ assessed, damage, loggedHours }: WorkingInput): WorkingStepDto[] {
  const dff = assessed.detail.designFatigueFactor;
  return [
    {
      title: 'Damage of the whole history',
      equation: 'D = sum of n_i / N_i',
      inputs: [value('h', 'logged hours behind the sum', loggedHours, 'h', 'the posted logs')],
      result: { symbol: 'D', value: damage, unit: '' },
      source: `${MINER}; cycles counted by ${ASTM}`,
    },
    {
      title: 'Allowance used',
      equation: 'u = D * DFF',
      inputs: [
        value('D', 'damage of the whole history', damage, '', 'the ledger'),
        value(
          'DFF',
          'design fatigue factor',
          dff,
          '',
          `the ${assessed.detail.name}: consequence and inspection`,
        ),
      ],
      result: { symbol: 'u', value: damage * dff, unit: '' },
      source: 'Allowable sum 1 / DFF, as in offshore fatigue rules; the factor is an engineering choice.',
    },
  ];
}

function remainingStep(
  { assessed, damage, loggedHours }: WorkingInput,
  plannedHoursPerYear: number,
  remainingYears: number,
): WorkingStepDto {
  return {
    title: 'Years until the allowance is used up',
    equation: 't = (1 / DFF - D) / (D / h * H)',
    inputs: [
      value(
        'DFF',
        'design fatigue factor',
        assessed.detail.designFatigueFactor,
        '',
        `the ${assessed.detail.name}`,
      ),
      value('D', 'damage so far', damage, '', 'the ledger'),
      value('h', 'logged hours', loggedHours, 'h', 'the posted logs'),
      value('H', 'planned sailing hours per year', plannedHoursPerYear, 'h', 'the usage plan'),
    ],
    result: { symbol: 't', value: remainingYears, unit: 'years' },
    source: 'Our rule date: what is left of the allowance over what planned sailing uses in a year.',
  };
}

function value(symbol: string, meaning: string, number: number, unit: string, from: string) {
  return { symbol, meaning, value: number, unit, from };
}

function mostDamagingCycle(spectrum: LoadSpectrum, evaluator: CycleEvaluator): CountedCycle | null {
  const toKn = spectrum.step > 0 ? spectrum.step : 1;
  let worst: CountedCycle | null = null;
  const consider = (lowKn: number, highKn: number, count: number, day: number, fromSlack = false): void => {
    const damage = count * evaluator.damageOf(evaluator.rangeOf(lowKn, highKn), lowKn, highKn);
    if (damage > (worst?.damage ?? 0)) worst = { lowKn, highKn, count, day, damage, fromSlack };
  };
  for (const { day, cycles } of spectrum.days) {
    cycles.low.forEach((low, i) => consider(low * toKn, cycles.high[i] * toKn, cycles.count[i], day));
  }
  const { residue, residueDay } = spectrum;
  for (let i = 1; i < residue.length; i++) {
    const rises = residue[i] > residue[i - 1];
    const [low, high] = rises ? [residue[i - 1], residue[i]] : [residue[i], residue[i - 1]];
    // The history begins with the turning point at zero load.
    consider(low * toKn, high * toKn, 0.5, residueDay[rises ? i : i - 1], i === 1 && low === 0);
  }
  return worst;
}

/** Points of the curve a detail is assessed on, evenly spread over the logarithm of the range. */
export function curvePointsOf(
  { model }: AssessedDetail,
  smallestRange: number,
  largestRange: number,
): { range: number; cyclesToFailure: number }[] {
  if (!(smallestRange > 0 && largestRange > smallestRange)) return [];
  const POINTS = 40;
  const curve = workingCurve(model);
  const growth = (largestRange / smallestRange) ** (1 / (POINTS - 1));
  return Array.from({ length: POINTS }, (_, i) => smallestRange * growth ** i)
    .map((range) => ({ range, cyclesToFailure: cyclesToFailure(curve, range) }))
    .filter((point) => Number.isFinite(point.cyclesToFailure));
}

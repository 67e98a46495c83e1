import { wholeHistory } from '@stayledger/shared/fatigue/account/whole-history';
import {
  type Candidate,
  compareCandidates,
  type Comparison,
  type CompareSetting,
} from '@stayledger/shared/fatigue/compare/compare-candidates';
import { compareHistory } from '@stayledger/shared/fatigue/compare/compare-history';
import { historyDamage } from '@stayledger/shared/fatigue/compare/history-damage';
import type { ReferenceCurve } from '@stayledger/shared/fatigue/curves/curve';
import { spectrumOf } from '@stayledger/shared/fatigue/rainflow/spectrum-of';
import { randomStreams } from '@stayledger/shared/fatigue/statistics/random-streams';
import type { BenchRow } from './bench-row.js';
import { makeHistory } from './make-history.js';
import { alternate, busyMs } from './measure.js';
import { DETAIL, MODEL, slowDamage } from './slow-damage.js';

const STEP_KN = 0.02;
const LOGS = 50;
/** Six hours at 4 Hz. */
const LOG_SAMPLES = 6 * 3600 * 4;
/** What pressing the history may move the damage by. */
const PRESSED_ERROR = 1e-3;

const CURVE: ReferenceCurve = {
  ...DETAIL.curve,
  id: 'bench',
  version: 1,
  name: 'Bench',
  appliesTo: 'the bench',
  measure: 'stress-metallic',
  level: 'mean-minus-k-sd',
  k: 2,
  sdLog10N: 0.2,
  environment: 'air',
  meanLoad: { kind: 'none', reason: 'made for the bench' },
  thickness: null,
  threadSize: null,
  cutOffRange: null,
  validity: { minRange: null, maxRange: null, note: '' },
  source: 'made for the bench',
  provenance: 'derived',
  provenanceNote: '',
  analogyNote: '',
  selectable: false,
};

/** What a person waits for who changes one input of a comparison of three materials on fifty logs. */
export const compareRow: BenchRow = {
  values: [
    {
      name: 'compareMs',
      what: 'ms per change in a comparison on 50 logs',
      better: 'lower',
      reach: 100,
      ambition: null,
    },
  ],
  async run() {
    const loads = makeHistory(LOGS * LOG_SAMPLES, 0.3, 7);
    const logs = Array.from({ length: LOGS }, (_, i) => ({
      loadLogId: `log-${i}`,
      fromMs: i,
      spectrum: spectrumOf(loads.subarray(i * LOG_SAMPLES, (i + 1) * LOG_SAMPLES), { step: STEP_KN, day: i }),
    }));
    const history = compareHistory(wholeHistory(logs), LOGS * 6);
    const setting: CompareSetting = {
      history,
      plannedHoursPerYear: 500,
      gainCov: 0.05,
      lengthM: 14,
      middleHeightM: 8,
      stretchLoadKn: 10,
      recordedStiffnessKn: 5000,
      parallelStiffnessKn: 8000,
      dockKn: 6,
      targetProbability: 0.01,
    };
    let area = 100;
    let comparison: Comparison | undefined;
    const { change } = await alternate(
      {
        change: () => {
          area += 1;
          const candidates = [
            candidateOf('as fitted', 110),
            candidateOf('changed', area),
            candidateOf('third', 140),
          ];
          comparison = compareCandidates(candidates, setting, randomStreams(1));
        },
      },
      busyMs,
    );
    // The part was slack before its first log.
    const slow = slowDamage([0, ...loads], STEP_KN);
    const pressed = historyDamage(history, MODEL, 1, 0.1).total[4];
    if (Math.abs(pressed / slow - 1) > PRESSED_ERROR) {
      throw new Error(`the pressed history says ${pressed}, the slow path ${slow}`);
    }
    if (comparison === undefined || comparison.pairs.length !== 3) throw new Error('nothing was compared');
    return { compareMs: change };
  },
};

/** A stay of six details, its two ends fixed so that means matter. */
function candidateOf(id: string, areaMm2: number): Candidate {
  const model = { ...MODEL, curve: CURVE, factor: 1000 / areaMm2 };
  const ends = { ...model, endBending: { fixedMisalignmentRad: 0.0044, swingRad: 0, youngMpa: 130_000 } };
  const details = [
    { name: 'free length', model },
    { name: 'upper terminal', model: ends },
    { name: 'lower terminal', model: ends },
    { name: 'turnbuckle thread', model },
    { name: 'pin', model },
    { name: 'chainplate', model: { ...model, stressConcentration: 1.5 } },
  ];
  return {
    id,
    name: id,
    kindOfWire: 'strand',
    details: details.map((detail) => ({ ...detail, modelSdLog10N: 0.25 })),
    notAssessedDetails: [],
    breakingLoadKn: 50,
    stiffnessKn: 5000,
    massKgPerM: 0.3,
    costMinor: 100_000,
    calendarYears: 10,
  };
}

import { threadSizeFactor } from '../fatigue/curves/thread-size-factor.js';
import type { EndBending } from '../fatigue/damage/detail-model.js';
import { designFatigueFactor } from '../fatigue/life/design-fatigue-factor.js';
import { type Articulation, MISALIGNMENT_RAD } from './articulation.js';
import type { DetailInputs, DetailKind, PartDetail, PartForDetails } from './part-detail.js';
import type { TerminalKind } from './terminals.js';

/** Version of the reference curves the defaults below point at. */
const CURVE_VERSION = 1;
/** Doubt about a borrowed curve, standard deviations of log10 N (engineering estimate, no source). */
const BORROWED_SD = 0.25;
/** Life divisors where the surroundings are harsher than those of the curve's tests. */
const DRAINED = 2;
const STANDING_WATER = 3;
/** Articulation taken where nobody described the end: a pin turns in one plane. */
const ASSUMED_ARTICULATION: Articulation = 'one-plane';
/** Size from which a thread's strength falls, EN 1993-1-9 detail 14. */
const THREAD_SIZE = { exponent: 0.25, referenceMm: 30 };

const DRAINED_WORDS = 'Salt air that drains: life divided by 2.';
const STANDING_WORDS = 'Salt water can stand in it: life divided by 3.';

const NAMES: Readonly<Record<DetailKind, string>> = {
  'free-length': 'free length',
  'upper-terminal': 'upper terminal',
  'lower-terminal': 'lower terminal',
  'turnbuckle-thread': 'turnbuckle thread',
  pin: 'pin',
  chainplate: 'chainplate',
};

/**
 * The details of a fitted part, each with its curve and the inputs of its model, as far as they are known: free
 * length, both terminals, turnbuckle thread, pin and chainplate. Fibre has none: it is kept by its calendar.
 *
 * Everything borrowed or assumed is listed under `estimates` in words. Nothing unknown is assumed to be strong: it is
 * "not assessed", with the reason.
 *
 * @throws RangeError for an area, diameter or modulus that is not above zero
 */
export function defaultDetails(part: PartForDetails): PartDetail[] {
  if (part.construction === 'fibre') return [];
  requirePositive('The metallic area', part.metallicAreaMm2);
  requirePositive("Young's modulus", part.youngMpa);
  return [
    freeLength(part),
    terminal(part, 'upper-terminal', part.upperTerminal, part.upperArticulation),
    terminal(part, 'lower-terminal', part.lowerTerminal, part.lowerArticulation),
    thread(part),
    pin(part),
    chainplate(part),
  ];
}

function freeLength(part: PartForDetails): PartDetail {
  const { curveId, words, estimates } = freeLengthCurve(part);
  return assessed(part, 'free-length', {
    curveId,
    inputs: { ...axial(1000 / part.metallicAreaMm2), lifeDivisor: DRAINED },
    hidden: false,
    borrowed: estimates.length > 0,
    explanation: `${words} ${DRAINED_WORDS} No fatigue limit is taken.`,
    estimates,
  });
}

function freeLengthCurve(part: PartForDetails): { curveId: string; words: string; estimates: string[] } {
  switch (part.construction) {
    case '1x19':
      return {
        curveId: 'en-1993-1-11-150',
        words: 'Spiral strand, EN 1993-1-11 category 150 on the metallic area.',
        estimates: ['The curve was measured on galvanised structural strand, not on stainless yacht wire.'],
      };
    case '1x19-compacted':
      return {
        curveId: 'en-1993-1-11-150',
        words: 'Spiral strand, EN 1993-1-11 category 150 on the metallic area of the compacted strand.',
        estimates: [
          'No tests of compacted strand were found; the curve of round-wire spiral strand is borrowed.',
        ],
      };
    case '7x19':
    case '7x7':
    case '6x7-fibre-core':
      return {
        curveId: 'dnv-os-e301-stranded-rope',
        words: 'Stranded rope, DNV-OS-E301 on the metallic area.',
        estimates: ['The curve was measured on mooring rope of heavy wires, not on flexible rigging rope.'],
      };
    case 'rod':
      return {
        curveId: 'en-1993-1-9-160',
        words: 'Plain rod, EN 1993-1-9 category 160 on the gross area.',
        estimates: [
          'Cold-drawn nitrogen-strengthened rod is not among the steels the category was measured on.',
        ],
      };
    case 'fibre':
      throw new RangeError('Fibre has no fatigue curve.');
  }
}

function terminal(
  part: PartForDetails,
  kind: 'upper-terminal' | 'lower-terminal',
  terminalKind: TerminalKind,
  articulation: Articulation | undefined,
): PartDetail {
  const choice = terminalCurve(part, terminalKind);
  if (typeof choice === 'string') return notAssessed(part, kind, true, choice);
  const upper = kind === 'upper-terminal';
  const assumed = articulation === undefined;
  const bending = endBending(articulation ?? ASSUMED_ARTICULATION, part.youngMpa);
  const estimates = [choice.estimate];
  if (assumed) {
    estimates.push(
      'How the end turns was not described: a misalignment of 0.25 degree is assumed, as with one plane.',
    );
  } else if (bending !== null) {
    estimates.push('The misalignment is the usual figure for such an end, not measured.');
  }
  return assessed(part, kind, {
    curveId: choice.curveId,
    inputs: {
      ...axial(1000 / part.metallicAreaMm2),
      lifeDivisor: upper ? DRAINED : STANDING_WATER,
      endBending: bending,
    },
    hidden: true,
    borrowed: true,
    explanation: [
      choice.words,
      bending === null
        ? 'It turns in both planes: no bending.'
        : 'Bending at the fixed end is added to the range.',
      upper ? DRAINED_WORDS : STANDING_WORDS,
      'No fatigue limit is taken.',
    ].join(' '),
    estimates,
  });
}

/** The curve of a terminal, or the reason why there is none. */
function terminalCurve(
  part: PartForDetails,
  kind: TerminalKind,
): { curveId: string; words: string; estimate: string } | string {
  if (part.construction === 'rod') {
    return kind === 'cold-head'
      ? {
          curveId: 'estimate-rod-head-50',
          words: 'Cold-formed head, category 50 on the gross area of the rod.',
          estimate:
            'No tests of cold-formed rod heads were found: category 50 is the low end of an estimate of 50 to 71.',
        }
      : 'Only cold-formed heads of rod have a curve; say how this end is made.';
  }
  switch (kind) {
    case 'swaged':
      return {
        curveId: 'estimate-strand-terminal-112',
        words: 'Swaged terminal, the EN 1993-1-11 shape at 112 MPa on the metallic area.',
        estimate: 'No tests of swaged terminals on stainless strand were found: category 112 is an estimate.',
      };
    case 'mechanical':
    case 'poured-socket':
      return {
        curveId: 'estimate-strand-terminal-125',
        words: `${kind === 'mechanical' ? 'Mechanical terminal' : 'Poured socket'}, the EN 1993-1-11 shape at 125 MPa on the metallic area.`,
        estimate:
          'No tests of such terminals on stainless yacht wire were found: category 125 is an estimate.',
      };
    case 'unknown':
      return 'The kind of terminal is not known.';
    case 'cold-head':
      return 'A cold-formed head belongs on rod; say how this end is made.';
    case 'ferrule-eye':
    case 'spliced-eye':
      return 'No usable fatigue curve exists for this kind of terminal.';
  }
}

function endBending(articulation: Articulation, youngMpa: number): EndBending | null {
  const fixedMisalignmentRad = MISALIGNMENT_RAD[articulation];
  return fixedMisalignmentRad === 0 ? null : { fixedMisalignmentRad, swingRad: 0, youngMpa };
}

function thread(part: PartForDetails): PartDetail {
  const size = part.thread;
  if (size === null) return notAssessed(part, 'turnbuckle-thread', false, 'The thread size is not known.');
  requirePositive('The tensile stress area of the thread', size.tensileStressAreaMm2);
  return assessed(part, 'turnbuckle-thread', {
    curveId: 'en-1993-1-9-50',
    inputs: {
      ...axial(1000 / size.tensileStressAreaMm2),
      sizeFactor: threadSizeFactor(size.diameterMm, THREAD_SIZE),
      lifeDivisor: DRAINED,
    },
    hidden: false,
    borrowed: false,
    explanation: `Thread ${size.designation} in tension, EN 1993-1-9 category 50 on its tensile stress area. A rigging screw is not preloaded: it takes the whole range. ${DRAINED_WORDS} No fatigue limit is taken.`,
    estimates: ['The screw is taken to be straight and pulled along its axis.'],
  });
}

function pin(part: PartForDetails): PartDetail {
  const diameter = part.pinDiameterMm;
  if (diameter === null) return notAssessed(part, 'pin', false, 'The pin diameter is not known.');
  requirePositive('The pin diameter', diameter);
  const shearAreaMm2 = (2 * Math.PI * diameter ** 2) / 4;
  return assessed(part, 'pin', {
    curveId: 'en-1993-1-9-shear-100',
    inputs: { ...axial(1000 / shearAreaMm2), lifeDivisor: DRAINED },
    hidden: false,
    borrowed: true,
    explanation: `Pin in double shear, EN 1993-1-9 category 100 on its two sections. ${DRAINED_WORDS} No fatigue limit is taken.`,
    estimates: ['The pin is taken to fit its holes: bending of the pin is not counted.'],
  });
}

function chainplate(part: PartForDetails): PartDetail {
  const plate = part.chainplate;
  if (plate === null) return notAssessed(part, 'chainplate', true, 'The chainplate was not described.');
  requirePositive('The area of the chainplate', plate.areaMm2);
  return assessed(part, 'chainplate', {
    curveId: plate.curveId,
    curveVersion: plate.curveVersion,
    inputs: {
      ...axial(1000 / plate.areaMm2),
      stressConcentration: plate.stressConcentration,
      sizeFactor: plate.sizeFactor,
      lifeDivisor: STANDING_WATER,
    },
    hidden: true,
    borrowed: false,
    explanation: `As described by a surveyor. ${STANDING_WORDS} No fatigue limit is taken.`,
    estimates: [],
  });
}

function axial(factor: number): DetailInputs {
  return {
    factor,
    stressConcentration: 1,
    sizeFactor: 1,
    lifeDivisor: 1,
    cutOff: 'none',
    mean: { kind: 'none' },
    endBending: null,
  };
}

interface AssessedChoice {
  curveId: string;
  curveVersion?: number;
  inputs: DetailInputs;
  hidden: boolean;
  borrowed: boolean;
  explanation: string;
  estimates: string[];
}

function assessed(part: PartForDetails, kind: DetailKind, choice: AssessedChoice): PartDetail {
  const dff = factorFor(part, choice.hidden);
  return {
    key: kind,
    name: NAMES[kind],
    kind,
    curveId: choice.curveId,
    curveVersion: choice.curveVersion ?? CURVE_VERSION,
    inputs: choice.inputs,
    notAssessedReason: null,
    designFatigueFactor: dff.factor,
    modelSdLog10N: choice.borrowed ? BORROWED_SD : 0,
    explanation: `${choice.explanation} Design fatigue factor ${dff.factor}: ${dff.words}`,
    estimates: choice.estimates,
  };
}

function notAssessed(part: PartForDetails, kind: DetailKind, hidden: boolean, reason: string): PartDetail {
  return {
    key: kind,
    name: NAMES[kind],
    kind,
    curveId: null,
    curveVersion: null,
    inputs: null,
    notAssessedReason: reason,
    designFatigueFactor: factorFor(part, hidden).factor,
    modelSdLog10N: 0,
    explanation: `Not assessed. ${reason}`,
    estimates: [],
  };
}

/** A routine inspection aloft sees what is in the open; it does not see into a terminal or below the deck. */
function factorFor(part: PartForDetails, hidden: boolean): { factor: number; words: string } {
  return designFatigueFactor({
    hidden,
    everOpened: false,
    inspectionInDate: !hidden && (part.inspectionInDate ?? false),
    lossDropsMast: part.lossDropsMast,
  });
}

function requirePositive(name: string, value: number): void {
  if (!(value > 0)) throw new RangeError(`${name} must be above zero, not ${value}.`);
}

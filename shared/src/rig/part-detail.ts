import type { DetailModel } from '../fatigue/damage/detail-model.js';
import type { Articulation } from './articulation.js';
import type { ConstructionKind } from './constructions.js';
import type { TerminalKind } from './terminals.js';

/** Everything about a detail's model that is not its curve; plain numbers, so that it can be stored with the account. */
export type DetailInputs = Omit<DetailModel, 'curve'>;

/** Kind of place on a part that can fail by itself. */
export type DetailKind =
  'free-length' | 'upper-terminal' | 'lower-terminal' | 'turnbuckle-thread' | 'pin' | 'chainplate';

/** A place on a fitted part that can fail by itself, with the way it is assessed. */
export interface PartDetail {
  /** Stable within the part: the kind. */
  key: DetailKind;
  name: string;
  kind: DetailKind;
  /** Null where no usable curve exists or an input is missing; `notAssessedReason` says which. */
  curveId: string | null;
  curveVersion: number | null;
  /** Null exactly where curveId is. */
  inputs: DetailInputs | null;
  notAssessedReason: string | null;
  designFatigueFactor: number;
  /** Extra standard deviation of log10 N because the curve is borrowed; widens the spread, never shifts the curve. */
  modelSdLog10N: number;
  /** What was assumed, in words for the part page. */
  explanation: string;
  /** Inputs that are estimates, one sentence each; a surveyor may confirm or change them. */
  estimates: string[];
}

/** A thread as its table knows it. */
export interface ThreadSize {
  designation: string;
  diameterMm: number;
  tensileStressAreaMm2: number;
}

/** A chainplate as a surveyor described it. */
export interface ChainplateDescription {
  curveId: string;
  curveVersion: number;
  /** Net section at the pin hole or the section at the weld, mm2. */
  areaMm2: number;
  stressConcentration: number;
  /** Factor on the range for thickness, 1 for none. */
  sizeFactor: number;
}

/** What is known of a fitted part when its details are laid out. */
export interface PartForDetails {
  construction: ConstructionKind;
  metallicAreaMm2: number;
  /** Young's modulus of the construction as built, MPa. */
  youngMpa: number;
  upperTerminal: TerminalKind;
  lowerTerminal: TerminalKind;
  /** Null: not known. */
  thread: ThreadSize | null;
  /** Null: not known. */
  pinDiameterMm: number | null;
  /** Null: not described. */
  chainplate: ChainplateDescription | null;
  upperArticulation?: Articulation;
  lowerArticulation?: Articulation;
  /** True where losing this part drops the mast; see positions. */
  lossDropsMast: boolean;
  /** True while an inspection of the visible details is in date. */
  inspectionInDate?: boolean;
}

import { readFileSync } from 'node:fs';
import { terminalsFileSchema, type ConstructionDto } from '@stayledger/shared/contracts/constructions';
import type { PartHardware } from '@stayledger/shared/contracts/parts';
import { assemblyStrength, type AssemblyStrength } from '@stayledger/shared/rig/assembly-strength';
import {
  constructionSize,
  knownBreakingLoad,
  metallicAreaMm2,
  type KnownBreakingLoad,
} from '@stayledger/shared/rig/constructions';
import type { Terminal, TerminalKind } from '@stayledger/shared/rig/terminals';
import type { FittedPart } from './fitted-part.entity.js';

let terminals: Map<TerminalKind, Terminal> | undefined;

export function terminal(kind: TerminalKind): Terminal {
  terminals ??= new Map(
    terminalsFileSchema
      .parse(JSON.parse(readFileSync(require.resolve('@stayledger/reference-data/terminals.json'), 'utf8')))
      .terminals.map((entry) => [entry.id, entry]),
  );
  const found = terminals.get(kind);
  if (!found) throw new Error(`The reference data lack the terminal ${kind}`);
  return found;
}

/** Metallic area by the table, or by the fill factor for a diameter the table does not list. */
export function areaOf(construction: ConstructionDto, diameterMm: number): number {
  return (
    constructionSize(construction, diameterMm)?.metallicAreaMm2 ??
    metallicAreaMm2(construction.fillFactor, diameterMm)
  );
}

/** The breaking load to work with; null for a diameter the table does not list and no certificate. */
export function breakingLoadOf(
  construction: ConstructionDto,
  diameterMm: number,
  certificateKn: number | null,
): KnownBreakingLoad | null {
  if (certificateKn !== null) return { breakingLoadKn: certificateKn, source: 'certificate' };
  const size = constructionSize(construction, diameterMm);
  return size ? knownBreakingLoad(size, null) : null;
}

/** Strength of the part as assembled. What nobody recorded is named as unknown, never taken for strong. */
export function assemblyOf(
  part: Pick<FittedPart, 'breakingLoadKn' | 'upperTerminal' | 'lowerTerminal' | 'hardware'>,
): AssemblyStrength {
  return assemblyStrength({
    wireBreakingLoadKn: part.breakingLoadKn,
    upperTerminalFactor: terminal(part.upperTerminal).staticFactor,
    lowerTerminalFactor: terminal(part.lowerTerminal).staticFactor,
    turnbuckleKn: strengthOf(part.hardware?.turnbuckle),
    toggleKn: strengthOf(part.hardware?.toggle),
    pinKn: strengthOf(part.hardware?.pin),
    chainplateKn: strengthOf(part.hardware?.chainplate),
  });
}

/** undefined: the assembly has none; null: not known. */
function strengthOf(element: PartHardware['pin'] | undefined): number | null | undefined {
  if (element === undefined) return null;
  return element.there ? element.breakingLoadKn : undefined;
}

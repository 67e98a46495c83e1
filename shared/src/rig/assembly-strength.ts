/** The elements of a stay from masthead to hull; null stands for "not known", undefined for "not there". */
export interface AssemblyElements {
  /** Breaking load of the wire, rod or rope itself, kN. */
  wireBreakingLoadKn: number | null;
  /** Share of it the upper end holds. */
  upperTerminalFactor: number | null;
  lowerTerminalFactor: number | null;
  /** Breaking loads of what stands in the same line, kN. */
  turnbuckleKn?: number | null;
  toggleKn?: number | null;
  pinKn?: number | null;
  chainplateKn?: number | null;
}

/** Breaking load of a whole assembly. */
export interface AssemblyStrength {
  /** The least of the known ones, kN; null when none is known. */
  breakingLoadKn: number | null;
  weakestElement: string | null;
  /** Elements nobody knows the strength of; while there is one, margins are provisional. */
  unknownElements: string[];
  provisional: boolean;
}

/**
 * Breaking load of a stay as fitted: the least of wire with each terminal's factor, turnbuckle, toggle, pin and
 * chainplate. An unknown element is named and never taken for strong.
 *
 * @throws RangeError for a strength or factor that is not above zero
 */
export function assemblyStrength(elements: AssemblyElements): AssemblyStrength {
  const wire = elements.wireBreakingLoadKn;
  const strengths: [string, number | null | undefined][] = [
    ['wire', wire],
    ['upper terminal', product(wire, elements.upperTerminalFactor)],
    ['lower terminal', product(wire, elements.lowerTerminalFactor)],
    ['turnbuckle', elements.turnbuckleKn],
    ['toggle', elements.toggleKn],
    ['pin', elements.pinKn],
    ['chainplate', elements.chainplateKn],
  ];
  let breakingLoadKn: number | null = null;
  let weakestElement: string | null = null;
  const unknownElements: string[] = [];
  for (const [name, strength] of strengths) {
    if (strength === undefined) continue;
    if (strength === null) {
      unknownElements.push(name);
      continue;
    }
    if (!(strength > 0))
      throw new RangeError(`The strength of the ${name} must be above zero, not ${strength}.`);
    if (breakingLoadKn === null || strength < breakingLoadKn) {
      breakingLoadKn = strength;
      weakestElement = name;
    }
  }
  return { breakingLoadKn, weakestElement, unknownElements, provisional: unknownElements.length > 0 };
}

function product(wire: number | null, factor: number | null): number | null {
  return wire === null || factor === null ? null : wire * factor;
}

import type { Provenance } from '../fatigue/curves/curve.js';

/** How a stay is built. */
export type ConstructionKind =
  '1x19' | '1x19-compacted' | '7x19' | '7x7' | '6x7-fibre-core' | 'rod' | 'fibre';

/** One breaking load of a size, with the wire grade it presumes. */
export interface TableBreakingLoad {
  /** Wire grade, MPa; null where the table is not by grade. */
  gradeMpa: number | null;
  breakingLoadKn: number;
}

/** One size of a construction. */
export interface ConstructionSize {
  /** As the trade calls it: "8 mm", "5/16 in", "-10". */
  designation: string;
  diameterMm: number;
  metallicAreaMm2: number;
  /** Lowest first; without a certificate the lowest one is used, and flagged. */
  breakingLoads: TableBreakingLoad[];
  massKgPerM: number;
  /** Axial stiffness E * A, kN. */
  axialStiffnessKn: number;
}

/** A construction of the reference data: versioned and immutable. */
export interface Construction {
  id: string;
  version: number;
  name: string;
  kind: ConstructionKind;
  kindOfWire: 'strand' | 'rod' | 'fibre';
  /** Key of materials.json. */
  materialId: string;
  /** Metallic area over the area of the enclosing circle. */
  fillFactor: number;
  /** Young's modulus of the construction as built (not of its wires), GPa. */
  youngGpa: number;
  /** Key of replacement-rules.json; null where the trade names no age. */
  replacementRuleId: string | null;
  sizes: ConstructionSize[];
  source: string;
  provenance: Provenance;
  provenanceNote: string;
}

/**
 * Metallic area of a stay: fill factor * pi / 4 * diameter^2.
 *
 * @param fillFactor 0.76 for 1x19 strand (two layers round the core), 0.56 for stranded rope, 1 for rod
 * @param diameterMm nominal diameter
 * @returns mm2
 * Source: EN 1993-1-11:2006 Table 2.2 (secondary).
 */
export function metallicAreaMm2(fillFactor: number, diameterMm: number): number {
  return (fillFactor * Math.PI * diameterMm ** 2) / 4;
}

/**
 * Breaking load of a spiral strand: metallic area * wire grade * spinning loss.
 *
 * @param metallicArea mm2
 * @param gradeMpa tensile grade of the wires, MPa
 * @param spinningLoss 0.88 for stainless 1x19
 * @returns kN
 * Source: form of EN 12385-2 as quoted with EN 1993-1-11 (secondary).
 */
export function strandBreakingLoadKn(metallicArea: number, gradeMpa: number, spinningLoss: number): number {
  return (metallicArea * gradeMpa * spinningLoss) / 1000;
}

/**
 * Breaking load of a stranded rope: factor * diameter^2 * wire grade.
 *
 * @param factor 0.332 for 6x7 with fibre core, 0.388 for 7x7, 0.362 for 7x19
 * @param diameterMm nominal diameter
 * @param gradeMpa tensile grade of the wires, MPa
 * @returns kN
 * Source: ISO 2408 / EN 12385-4 (from memory); 6x7 recomputed from ISO 10425 Table C.1.
 */
export function ropeBreakingLoadKn(factor: number, diameterMm: number, gradeMpa: number): number {
  return (factor * diameterMm ** 2 * gradeMpa) / 1000;
}

/**
 * Factor of a stranded rope from one published breaking load, the inverse of {@link ropeBreakingLoadKn}.
 */
export function ropeFactor(breakingLoadKn: number, diameterMm: number, gradeMpa: number): number {
  return (breakingLoadKn * 1000) / (diameterMm ** 2 * gradeMpa);
}

/**
 * Mass of a stay: metallic area * density * lay factor.
 *
 * @param metallicArea mm2
 * @param densityKgPerDm3 7.98 for 316, 7.85 for carbon steel (the same number as g/cm3)
 * @param layFactor 1.03 for laid wires, 1 for rod (common practice, no source)
 * @returns kg/m
 */
export function massKgPerM(metallicArea: number, densityKgPerDm3: number, layFactor: number): number {
  return (metallicArea * densityKgPerDm3 * layFactor) / 1000;
}

/**
 * Axial stiffness E * A.
 *
 * @param youngGpa of the construction, GPa
 * @param metallicArea mm2
 * @returns kN (GPa times mm2 is kN)
 */
export function axialStiffnessKn(youngGpa: number, metallicArea: number): number {
  return youngGpa * metallicArea;
}

/** Diameters in a table and on a work order may differ in the second decimal (5/16 in is 7.94 or 7.938 mm). */
const SAME_DIAMETER_MM = 0.02;

/**
 * The size of a construction with this diameter.
 *
 * @returns undefined when the table has no such size
 */
export function constructionSize(
  construction: Pick<Construction, 'sizes'>,
  diameterMm: number,
): ConstructionSize | undefined {
  return construction.sizes.find((size) => Math.abs(size.diameterMm - diameterMm) <= SAME_DIAMETER_MM);
}

/** A breaking load with where it comes from. */
export interface KnownBreakingLoad {
  breakingLoadKn: number;
  source: 'certificate' | 'table' | 'table-lower-grade';
}

/**
 * Breaking load to work with: the certificate's where there is one, else the lowest of the table.
 *
 * @param certificateKn from the certificate, null without one
 * @throws RangeError for a size without any breaking load
 */
export function knownBreakingLoad(size: ConstructionSize, certificateKn: number | null): KnownBreakingLoad {
  if (certificateKn !== null) return { breakingLoadKn: certificateKn, source: 'certificate' };
  const loads = size.breakingLoads.map((load) => load.breakingLoadKn);
  if (loads.length === 0) throw new RangeError(`The table names no breaking load for ${size.designation}.`);
  return { breakingLoadKn: Math.min(...loads), source: loads.length > 1 ? 'table-lower-grade' : 'table' };
}

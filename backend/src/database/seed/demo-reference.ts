import { createHash } from 'node:crypto';
import type { EntityManager } from '@mikro-orm/postgresql';
import { constructionSchema } from '@stayledger/shared/contracts/constructions';
import { curveSchema } from '@stayledger/shared/contracts/curves';
import { Construction } from '../../constructions/construction.entity.js';
import { Curve } from '../../curves/curve.entity.js';
import { canonicalJson, type CanonicalValue } from '../../ledger/canonical-json.js';

const SOURCE = 'Invented for the demo';

/** Slope 4.5 through 88 MPa at two million cycles: log10 a = log10(2e6) + 4.5 log10 88 = 15.051. */
const BENCH_SERIES = curveSchema.parse({
  id: 'own-0190d3a0-0005-7000-8000-000000000001',
  version: 1,
  name: 'Bench series of the yard, 10 mm swaged eyes',
  appliesTo: '1x19 strand, stainless 316, 10 mm, with swaged eyes',
  measure: 'stress-metallic',
  level: 'mean-minus-k-sd',
  k: 2,
  sdLog10N: 0.21,
  environment: 'air',
  segments: [{ above: 0, m: 4.5, log10a: 15.051 }],
  meanLoad: { kind: 'none', reason: 'taken as tested: the mean load of the tests is in the curve.' },
  thickness: null,
  threadSize: null,
  cutOffRange: null,
  validity: {
    minRange: 70,
    maxRange: 260,
    note: 'Within the ranges tested; beyond them the line is carried on.',
  },
  source: SOURCE,
  provenance: 'estimate',
  provenanceNote: 'Made up, so that the page of a firm’s own curves has one to show. Not for use.',
  analogyNote: 'The wire and the ends are those of the parts it would serve.',
  selectable: true,
});

/** Stiffness 132 GPa on 48.6 mm2 is 6415.2 kN; 48.6 of the 63.62 mm2 of a 9 mm circle is a fill of 0.764. */
const BY_CERTIFICATE = constructionSchema.parse({
  id: 'own-0190d3a0-0006-7000-8000-000000000001',
  version: 1,
  name: '1x19 strand by certificate, 9 mm',
  kind: '1x19',
  kindOfWire: 'strand',
  materialId: 'stainless-316-wire',
  fillFactor: 0.764,
  youngGpa: 132,
  replacementRuleId: 'stainless-wire',
  sizes: [
    {
      designation: '9 mm',
      diameterMm: 9,
      metallicAreaMm2: 48.6,
      breakingLoads: [{ gradeMpa: null, breakingLoadKn: 59.5 }],
      massKgPerM: 0.4,
      axialStiffnessKn: 6415.2,
    },
  ],
  source: SOURCE,
  provenance: 'estimate',
  provenanceNote: 'Made up, so that the page of a firm’s own constructions has one to show.',
});

/** What the demo's rigging practice added of its own. */
export async function seedOwnReference(em: EntityManager, firmId: string, now: Date): Promise<void> {
  const row = <Data extends { id: string; version: number; name: string }>(data: Data) => ({
    id: data.id,
    version: data.version,
    name: data.name,
    firm: firmId,
    data,
    dataHash: createHash('sha256')
      .update(canonicalJson(JSON.parse(JSON.stringify(data)) as CanonicalValue))
      .digest('hex'),
    createdAt: now,
  });
  await em.insert(Curve, row(BENCH_SERIES));
  await em.insert(Construction, row(BY_CERTIFICATE));
}

import { createHash } from 'node:crypto';
import type { EntityManager } from '@mikro-orm/postgresql';
import type { ReferenceCurve } from '@stayledger/shared/fatigue/curves/curve';
import type { DetailModel } from '@stayledger/shared/fatigue/damage/detail-model';
import { detailModelOf } from '@stayledger/shared/rig/detail-model-of';
import { Curve } from '../curves/curve.entity.js';
import { type CanonicalValue, canonicalJson } from '../ledger/canonical-json.js';
import { PartDetail } from './part-detail.entity.js';

/** A detail that can be assessed, with its curve put in. */
export interface AssessedDetail {
  detail: PartDetail;
  curve: ReferenceCurve;
  model: DetailModel;
  /** Names the curve and every input, so that an entry says exactly what it was computed with. */
  modelSha256: string;
}

/** The details of a part that have a usable curve, in a fixed order. */
export async function assessedDetailsOf(em: EntityManager, partId: string): Promise<AssessedDetail[]> {
  const details = await em.find(PartDetail, { fittedPart: partId }, { orderBy: { key: 'asc' } });
  const assessed: AssessedDetail[] = [];
  for (const detail of details) {
    if (detail.curve === null) continue;
    const [id, version] = detail.curve;
    const { data } = await em.findOneOrFail(Curve, { id, version });
    // Reference data pass their schema before they reach the table, and rows of it never change.
    const curve = data as ReferenceCurve;
    const model = detailModelOf(
      { curveId: id, curveVersion: version, inputs: detail.model.inputs, name: detail.name },
      curve,
    );
    if (model === null) continue;
    assessed.push({ detail, curve, model, modelSha256: hashOf(detail) });
  }
  return assessed;
}

function hashOf(detail: PartDetail): string {
  return modelSha256Of(detail.curve, asStored(detail.model.inputs));
}

/** Names a curve in its version and the inputs put to it. */
export function modelSha256Of(curve: [string, number] | null, inputs: CanonicalValue): string {
  return createHash('sha256').update(canonicalJson({ curve, inputs })).digest('hex');
}

/** Through JSON once, so that what is hashed is what a row holds. */
export function asStored(value: unknown): CanonicalValue {
  return JSON.parse(JSON.stringify(value)) as CanonicalValue;
}

import type { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { Construction as ConstructionData } from '@stayledger/shared/rig/constructions';
import { defaultDetails } from '@stayledger/shared/rig/default-details';
import type { PartDetail as DescribedDetail } from '@stayledger/shared/rig/part-detail';
import { positionKind } from '@stayledger/shared/rig/positions';
import { Clock } from '../common/clock/clock.js';
import { newId } from '../common/ids/new-id.js';
import { Construction } from '../constructions/construction.entity.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { Position } from '../rig/position.entity.js';
import { PartDetail } from './part-detail.entity.js';
import { threadSize } from './reference-rules.js';

/** Lays out the details of a fitted part and keeps them in step with its description. */
@Injectable()
export class PartDetailsService {
  constructor(private readonly clock: Clock) {}

  /**
   * Writes the details a part has by its description, in the running transaction. A detail whose model is unchanged
   * keeps its version; a detail is never deleted, since its account stands.
   */
  async describe(em: EntityManager, part: FittedPart): Promise<void> {
    const described = await this.detailsOf(em, part);
    const stored = await em.find(PartDetail, { fittedPart: part.id });
    const now = this.clock.now();
    for (const detail of described) {
      const row = stored.find((one) => one.key === detail.key);
      if (!row) {
        em.persist(
          em.create(PartDetail, {
            id: newId(),
            vessel: part.vessel,
            fittedPart: part.id,
            key: detail.key,
            createdAt: now,
            updatedAt: now,
            ...columnsOf(detail),
          }),
        );
        continue;
      }
      const columns = columnsOf(detail);
      if (sameColumns(row, columns)) continue;
      em.assign(row, { ...columns, updatedAt: now });
    }
    for (const row of stored) {
      if (described.some((detail) => detail.key === row.key) || row.curve === null) continue;
      const reason = 'This construction has no such detail with a usable curve.';
      em.assign(row, {
        curve: null,
        model: { inputs: null, notAssessedReason: reason, modelSdLog10N: 0 },
        explanation: `Not assessed. ${reason}`,
        estimates: [],
        updatedAt: now,
      });
    }
    await em.flush();
  }

  private async detailsOf(em: EntityManager, part: FittedPart): Promise<DescribedDetail[]> {
    const [id, version] = part.construction;
    const construction = (await em.findOneOrFail(Construction, { id, version })).data as ConstructionData;
    const position = await em.findOneOrFail(Position, part.position);
    return defaultDetails({
      construction: construction.kind,
      metallicAreaMm2: part.metallicAreaMm2,
      youngMpa: construction.youngGpa * 1000,
      upperTerminal: part.upperTerminal,
      lowerTerminal: part.lowerTerminal,
      upperArticulation: part.hardware?.upperArticulation ?? undefined,
      lowerArticulation: part.hardware?.lowerArticulation ?? undefined,
      thread: part.threadSize === null ? null : (threadSize(part.threadSize) ?? null),
      pinDiameterMm: part.pinDiameterMm,
      chainplate: null,
      // Of a kind of position nobody described, the loss is taken to drop the mast.
      lossDropsMast: positionKind(position.kind)?.lossDropsMast ?? true,
    });
  }
}

type Columns = Pick<
  PartDetail,
  'name' | 'kind' | 'curve' | 'model' | 'designFatigueFactor' | 'explanation' | 'estimates'
>;

function columnsOf(detail: DescribedDetail): Columns {
  const { curveId, curveVersion } = detail;
  return {
    name: detail.name,
    kind: detail.kind,
    curve: curveId === null || curveVersion === null ? null : [curveId, curveVersion],
    model: {
      inputs: detail.inputs,
      notAssessedReason: detail.notAssessedReason,
      modelSdLog10N: detail.modelSdLog10N,
    },
    designFatigueFactor: detail.designFatigueFactor,
    explanation: detail.explanation,
    estimates: detail.estimates,
  };
}

function sameColumns(row: PartDetail, columns: Columns): boolean {
  const keys = Object.keys(columns) as (keyof Columns)[];
  return keys.every((key) => sorted(row[key]) === sorted(columns[key]));
}

/** Rows come back from jsonb with their keys in another order. */
function sorted(value: unknown): string {
  return JSON.stringify(value, (_key, inner: unknown) =>
    inner !== null && typeof inner === 'object' && !Array.isArray(inner)
      ? Object.fromEntries(Object.entries(inner).sort(([a], [b]) => (a < b ? -1 : 1)))
      : inner,
  );
}

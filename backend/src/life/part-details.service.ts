import type { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { ReferenceCurve } from '@stayledger/shared/fatigue/curves/curve';
import type { Construction as ConstructionData } from '@stayledger/shared/rig/constructions';
import { chooseDetail } from '@stayledger/shared/rig/choose-detail';
import { defaultDetails } from '@stayledger/shared/rig/default-details';
import type { PartDetail as DescribedDetail } from '@stayledger/shared/rig/part-detail';
import { positionKind } from '@stayledger/shared/rig/positions';
import { Clock } from '../common/clock/clock.js';
import { newId } from '../common/ids/new-id.js';
import { Construction } from '../constructions/construction.entity.js';
import { Curve } from '../curves/curve.entity.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { Position } from '../rig/position.entity.js';
import { DetailChoice } from './detail-choice.entity.js';
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
    const choices = await em.find(DetailChoice, { fittedPart: part.id });
    const described = await this.detailsOf(em, part, choices);
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

  /** The details a part has by its description, with what people decided laid over it. Writes nothing. */
  async detailsOf(
    em: EntityManager,
    part: FittedPart,
    choices: readonly DecidedInputs[],
  ): Promise<DescribedDetail[]> {
    const articulationOf = (key: DescribedDetail['key']) =>
      choices.find((choice) => choice.key === key)?.articulation ?? null;
    const thread = part.threadSize === null ? null : (threadSize(part.threadSize) ?? null);
    const [id, version] = part.construction;
    const construction = (await em.findOneOrFail(Construction, { id, version })).data as ConstructionData;
    const position = await em.findOneOrFail(Position, part.position);
    const defaults = defaultDetails({
      construction: construction.kind,
      metallicAreaMm2: part.metallicAreaMm2,
      youngMpa: construction.youngGpa * 1000,
      upperTerminal: part.upperTerminal,
      lowerTerminal: part.lowerTerminal,
      upperArticulation: articulationOf('upper-terminal') ?? part.hardware?.upperArticulation ?? undefined,
      lowerArticulation: articulationOf('lower-terminal') ?? part.hardware?.lowerArticulation ?? undefined,
      thread,
      pinDiameterMm: part.pinDiameterMm,
      chainplate: null,
      // Of a kind of position nobody described, the loss is taken to drop the mast.
      lossDropsMast: positionKind(position.kind)?.lossDropsMast ?? true,
    });
    const chosen: DescribedDetail[] = [];
    for (const detail of defaults) {
      const choice = choices.find(({ key }) => key === detail.key);
      chosen.push(
        choice
          ? chooseDetail(
              detail,
              {
                curve: choice.curve && (await curveData(em, choice.curve)),
                designFatigueFactor: choice.designFatigueFactor,
              },
              await measureOf(em, detail),
              detail.kind === 'turnbuckle-thread' ? (thread?.diameterMm ?? null) : null,
            )
          : detail,
      );
    }
    return chosen;
  }
}

/** The part of a stored choice that decides a model. */
export type DecidedInputs = Pick<DetailChoice, 'key' | 'curve' | 'articulation' | 'designFatigueFactor'>;

async function curveData(em: EntityManager, [id, version]: [string, number]): Promise<ReferenceCurve> {
  // Reference data pass their schema before they reach the table, and rows of it never change.
  return (await em.findOneOrFail(Curve, { id, version })).data as ReferenceCurve;
}

/** Measure of the default curve; null for a detail without one. */
async function measureOf(
  em: EntityManager,
  { curveId, curveVersion }: DescribedDetail,
): Promise<ReferenceCurve['measure'] | null> {
  if (curveId === null || curveVersion === null) return null;
  return (await curveData(em, [curveId, curveVersion])).measure;
}

type Columns = Pick<
  PartDetail,
  'name' | 'kind' | 'curve' | 'model' | 'designFatigueFactor' | 'explanation' | 'estimates'
>;

/** A detail as its row holds it. */
export function columnsOf(detail: DescribedDetail): Columns {
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

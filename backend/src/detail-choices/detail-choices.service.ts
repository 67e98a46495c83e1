import { EntityManager, LockMode } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { CurveListDto, ListedCurveDto } from '@stayledger/shared/contracts/curves';
import type {
  ChooseDetailInput,
  DetailChoiceDto,
  DetailChoiceEffectDto,
  DetailChoicesDto,
  DetailWithChoiceDto,
  PreviewDetailChoiceInput,
} from '@stayledger/shared/contracts/detail-choices';
import { accountOf } from '@stayledger/shared/fatigue/account/account-of';
import type { ReferenceCurve } from '@stayledger/shared/fatigue/curves/curve';
import { detailModelOf } from '@stayledger/shared/rig/detail-model-of';
import type { PartDetail as DescribedDetail } from '@stayledger/shared/rig/part-detail';
import { AuditService } from '../audit/audit.service.js';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import {
  InvalidRequestError,
  NotFoundError,
  StateConflictError,
  VersionConflictError,
} from '../common/errors/app-error.js';
import { newId } from '../common/ids/new-id.js';
import { Curve } from '../curves/curve.entity.js';
import { CurvesService } from '../curves/curves.service.js';
import { standingAmong } from '../ledger/account.service.js';
import { LedgerEntry } from '../ledger/ledger-entry.entity.js';
import { type LogOfPart, PartHistory } from '../ledger/part-history.js';
import { DetailChoice } from '../life/detail-choice.entity.js';
import { asStored, modelSha256Of } from '../life/detail-models.js';
import { PartDetail } from '../life/part-detail.entity.js';
import { type DecidedInputs, PartDetailsService } from '../life/part-details.service.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { PartFigures } from '../parts/part-figures.service.js';
import { User } from '../users/user.entity.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';

/** Lets people put what they know in place of what a detail is given by default, with what it rests on. */
@Injectable()
export class DetailChoicesService {
  constructor(
    private readonly em: EntityManager,
    private readonly reach: VesselReach,
    private readonly curves: CurvesService,
    private readonly details: PartDetailsService,
    private readonly history: PartHistory,
    private readonly figures: PartFigures,
    private readonly audit: AuditService,
    private readonly clock: Clock,
  ) {}

  async list(me: Principal, partId: string): Promise<DetailChoicesDto> {
    const { part } = await this.reach.partOrFail(me, partId, 'life:read');
    const rows = await this.em.find(
      PartDetail,
      { fittedPart: part.id },
      { orderBy: { createdAt: 'asc', id: 'asc' } },
    );
    const choices = await this.em.find(DetailChoice, { fittedPart: part.id }, { refresh: true });
    const curves = await this.curves.list(me);
    const items: DetailWithChoiceDto[] = [];
    for (const row of rows) {
      items.push(await this.toItem(row, choices.find(({ key }) => key === row.key) ?? null, curves));
    }
    return { partId: part.id, items };
  }

  /** What a choice would do to allowance and account, worked out from the stored spectra. Writes nothing. */
  async preview(
    me: Principal,
    partId: string,
    key: string,
    input: PreviewDetailChoiceInput,
  ): Promise<DetailChoiceEffectDto> {
    const { part } = await this.reach.partOrFail(me, partId, 'rig:update');
    const row = await this.detailOrFail(part, key);
    await this.check(me, row, input);
    const after = await this.describedWith(part, row, input);
    const logs = await this.history.logsOf(this.em, part);
    const entries = await this.em.find(LedgerEntry, { partDetail: row.id }, { orderBy: { sequence: 'asc' } });
    const [hashBefore, hashAfter] = [hashOf(row.curve, row.model.inputs), hashOfDescribed(after)];
    return {
      before: await this.allowance(logs, describedNow(row)),
      after: await this.allowance(logs, after),
      entriesReversed: hashBefore === hashAfter ? 0 : standingAmong(entries).length,
      explanation: after.explanation,
      estimates: after.estimates,
    };
  }

  /** Keeps a choice, reverses and rewrites what stood on the inputs before it, and dates the part anew. */
  async choose(
    me: Principal,
    partId: string,
    key: string,
    input: ChooseDetailInput,
  ): Promise<DetailChoicesDto> {
    const { part: found, vessel } = await this.reach.partOrFail(me, partId, 'rig:update');
    // Two people deciding at once: the second waits here and then finds the other's version.
    const part = await this.em.findOneOrFail(
      FittedPart,
      { id: found.id },
      { lockMode: LockMode.PESSIMISTIC_WRITE, refresh: true },
    );
    const row = await this.detailOrFail(part, key);
    const stored = await this.em.findOne(
      DetailChoice,
      { fittedPart: part.id, key: row.key },
      { refresh: true },
    );
    if (stored?.version !== input.version) {
      throw new VersionConflictError(stored && (await this.toDto(stored)));
    }
    if (part.removedOn !== null) {
      throw new StateConflictError('This part has been taken off; its details stay as they were.', null);
    }
    await this.check(me, row, input);
    const now = this.clock.now();
    const decided = {
      curve: input.curve && ([input.curve.id, input.curve.version] as [string, number]),
      articulation: input.articulation,
      designFatigueFactor: input.designFatigueFactor,
      evidence: input.evidence,
      confirmedBy: me.userId,
      updatedAt: now,
    };
    const choice = stored
      ? this.em.assign(stored, decided)
      : this.em.create(DetailChoice, {
          id: newId(),
          vessel: vessel.id,
          fittedPart: part.id,
          key: row.key,
          createdAt: now,
          ...decided,
        });
    await this.em.persist(choice).flush();
    await this.figures.refresh(part, me.userId, `${row.name} described anew: ${input.evidence}`);
    await this.audit.record(this.em, {
      userId: me.userId,
      vesselId: vessel.id,
      action: 'detail.chosen',
      subjectKind: 'part',
      subjectId: part.id,
      data: {
        detail: row.key,
        curve: input.curve,
        articulation: input.articulation,
        designFatigueFactor: input.designFatigueFactor,
        evidence: input.evidence,
      },
    });
    return this.list(me, part.id);
  }

  private async detailOrFail(part: FittedPart, key: string): Promise<PartDetail> {
    const row = await this.em.findOne(PartDetail, { fittedPart: part.id, key: key as PartDetail['key'] });
    if (!row) throw new NotFoundError();
    return row;
  }

  /** Refuses what could not be used, in the words of the field it is about. */
  private async check(me: Principal, row: PartDetail, input: PreviewDetailChoiceInput): Promise<void> {
    const errors: Record<string, string[]> = {};
    if (input.curve !== null) {
      const chosen = input.curve;
      const fitting = await this.fittingCurves(row, await this.curves.list(me));
      if (row.curve === null) {
        errors.curve = [`Describe the part first. ${row.model.notAssessedReason ?? ''}`.trim()];
      } else if (!fitting.some(({ id, version }) => id === chosen.id && version === chosen.version)) {
        errors.curve = ['Choose a curve from the list: of the same measure, in its newest version.'];
      }
    }
    if (input.articulation !== null && !hasArticulation(row)) {
      errors.articulation = ['Only ends turn.'];
    }
    if (Object.keys(errors).length > 0) throw new InvalidRequestError(errors);
  }

  private async describedWith(
    part: FittedPart,
    row: PartDetail,
    input: PreviewDetailChoiceInput,
  ): Promise<DescribedDetail> {
    const choices = await this.em.find(DetailChoice, { fittedPart: part.id });
    const proposed: DecidedInputs = {
      key: row.key,
      curve: input.curve && [input.curve.id, input.curve.version],
      articulation: input.articulation,
      designFatigueFactor: input.designFatigueFactor,
    };
    const described = await this.details.detailsOf(this.em, part, [
      ...choices.filter(({ key }) => key !== row.key),
      proposed,
    ]);
    const found = described.find(({ key }) => key === row.key);
    if (!found) throw new NotFoundError();
    return found;
  }

  private async allowance(logs: readonly LogOfPart[], detail: DescribedDetail): Promise<number | null> {
    if (detail.curveId === null || detail.curveVersion === null || logs.length === 0) return null;
    const curve = await this.curveOf([detail.curveId, detail.curveVersion]);
    const model = detailModelOf(detail, curve);
    return model && accountOf(logs, model).total * detail.designFatigueFactor;
  }

  private async curveOf([id, version]: [string, number]): Promise<ReferenceCurve> {
    return (await this.em.findOneOrFail(Curve, { id, version })).data as ReferenceCurve;
  }

  private async fittingCurves(row: PartDetail, { items }: CurveListDto): Promise<ListedCurveDto[]> {
    if (row.curve === null) return [];
    const { measure } = await this.curveOf(row.curve);
    return items.filter((curve) => curve.selectable && curve.measure === measure);
  }

  private async toItem(
    row: PartDetail,
    choice: DetailChoice | null,
    curves: CurveListDto,
  ): Promise<DetailWithChoiceDto> {
    const curve = row.curve && (await this.curveOf(row.curve));
    return {
      key: row.key,
      name: row.name,
      curve: curve && { id: curve.id, version: curve.version, name: curve.name },
      designFatigueFactor: row.designFatigueFactor,
      explanation: row.explanation,
      estimates: row.estimates,
      notAssessedReason: row.model.notAssessedReason,
      hasArticulation: hasArticulation(row),
      choice: choice && (await this.toDto(choice)),
      curves: (await this.fittingCurves(row, curves)).map(
        ({ id, version, name, appliesTo, environment, provenance }) => ({
          id,
          version,
          name,
          appliesTo,
          environment,
          provenance,
        }),
      ),
    };
  }

  private async toDto(choice: DetailChoice): Promise<DetailChoiceDto> {
    const user = await this.em.findOne(User, { id: choice.confirmedBy });
    return {
      curve: choice.curve && { id: choice.curve[0], version: choice.curve[1] },
      articulation: choice.articulation,
      designFatigueFactor: choice.designFatigueFactor,
      evidence: choice.evidence,
      confirmedByName: user?.name ?? '',
      confirmedAt: choice.updatedAt.toISOString(),
      version: choice.version,
    };
  }
}

function hasArticulation({ kind }: PartDetail): boolean {
  return kind === 'upper-terminal' || kind === 'lower-terminal';
}

function describedNow(row: PartDetail): DescribedDetail {
  return {
    key: row.key,
    name: row.name,
    kind: row.kind,
    curveId: row.curve?.[0] ?? null,
    curveVersion: row.curve?.[1] ?? null,
    inputs: row.model.inputs,
    notAssessedReason: row.model.notAssessedReason,
    designFatigueFactor: row.designFatigueFactor,
    modelSdLog10N: row.model.modelSdLog10N,
    explanation: row.explanation,
    estimates: row.estimates,
  };
}

function hashOf(curve: [string, number] | null, inputs: DescribedDetail['inputs']): string {
  return modelSha256Of(curve, asStored(inputs));
}

function hashOfDescribed({ curveId, curveVersion, inputs }: DescribedDetail): string {
  return hashOf(curveId === null || curveVersion === null ? null : [curveId, curveVersion], inputs);
}

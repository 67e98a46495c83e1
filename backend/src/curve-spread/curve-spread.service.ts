import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { CurveSpreadDto } from '@stayledger/shared/contracts/curve-spread';
import { accountOf } from '@stayledger/shared/fatigue/account/account-of';
import type { ReferenceCurve } from '@stayledger/shared/fatigue/curves/curve';
import type { Construction as ConstructionData } from '@stayledger/shared/rig/constructions';
import { freeLengthOn, strandCurveIds } from '@stayledger/shared/rig/strand-curves';
import type { Principal } from '../auth/principal.js';
import { Construction } from '../constructions/construction.entity.js';
import { Curve } from '../curves/curve.entity.js';
import { PartHistory } from '../ledger/part-history.js';
import { PartDetail } from '../life/part-detail.entity.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';

/** How far the standards lie apart for one part's own history. */
@Injectable()
export class CurveSpreadService {
  constructor(
    private readonly em: EntityManager,
    private readonly reach: VesselReach,
    private readonly history: PartHistory,
  ) {}

  async ofPart(me: Principal, partId: string): Promise<CurveSpreadDto> {
    const { part } = await this.reach.partOrFail(me, partId, 'life:read');
    const [id, version] = part.construction;
    const stored = await this.em.findOneOrFail(Construction, { id, version });
    const { kind } = stored.data as ConstructionData;
    const wire = await this.em.findOne(PartDetail, { fittedPart: part.id, key: 'free-length' });
    const logs = await this.history.logsOf(this.em, part);
    const items: CurveSpreadDto['items'] = [];
    const inputs = wire?.model.inputs ?? null;
    if (wire && inputs && logs.length > 0) {
      for (const curveId of strandCurveIds(kind)) {
        const curve = await this.newest(curveId);
        const model = freeLengthOn(curve, {
          metallicAreaMm2: part.metallicAreaMm2,
          breakingLoadKn: part.breakingLoadKn,
          lifeDivisor: inputs.lifeDivisor,
        });
        items.push({
          curveId: curve.id,
          curveVersion: curve.version,
          curveName: curve.name,
          level: curve.level,
          isUsed: wire.curve?.[0] === curve.id && wire.curve[1] === curve.version,
          allowance: accountOf(logs, model).total * wire.designFatigueFactor,
        });
      }
    }
    return {
      partId: part.id,
      loggedHours: logs.reduce((sum, log) => sum + log.loggedHours, 0),
      designFatigueFactor: wire?.designFatigueFactor ?? 1,
      items: items.sort((a, b) => b.allowance - a.allowance),
    };
  }

  private async newest(id: string): Promise<ReferenceCurve> {
    const [row] = await this.em.find(Curve, { id }, { orderBy: { version: 'desc' }, limit: 1 });
    if (!row) throw new Error(`The reference data lack the curve ${id}`);
    return row.data as ReferenceCurve;
  }
}

import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { LogReviewDto } from '@stayledger/shared/contracts/load-logs';
import type { Principal } from '../auth/principal.js';
import { Position } from '../rig/position.entity.js';
import { decodeEnvelope, traceOf } from '../storage/envelope-codec.js';
import type { LoadLog } from './load-log.entity.js';
import { LoadLogReplies } from './load-log-replies.js';
import { LoadLogsService } from './load-logs.service.js';
import { LogChannel } from './log-channel.entity.js';
import { PostingPlanService } from './posting-plan.service.js';

const TRACE_POINTS_MAX = 600;
const NO_POINTS = { atMs: [], lowKn: [], highKn: [] };

/** Everything a person looks at before deciding about a log. */
@Injectable()
export class ReviewService {
  constructor(
    private readonly em: EntityManager,
    private readonly logs: LoadLogsService,
    private readonly replies: LoadLogReplies,
    private readonly plan: PostingPlanService,
  ) {}

  async review(me: Principal, loadLogId: string): Promise<LogReviewDto> {
    const log = await this.logs.findOrFail(me, loadLogId, 'load-logs:read');
    const { parts, obstacle } = await this.plan.review(log);
    return {
      log: await this.replies.one(log),
      traces: await this.traces(log),
      parts,
      postDisabledReason: obstacle,
    };
  }

  private async traces(log: LoadLog): Promise<LogReviewDto['traces']> {
    const channels = await this.em.find(
      LogChannel,
      { loadLog: log.id, mappingVersion: log.mappingVersion, engineVersion: log.engineVersion ?? '' },
      { orderBy: { columnName: 'asc' } },
    );
    const positions = await this.em.find(Position, { id: { $in: channels.map(({ position }) => position) } });
    const labels = new Map(positions.map(({ id, label }) => [id, label]));
    return channels.map((channel) => ({
      column: channel.columnName,
      positionId: channel.position,
      positionLabel: labels.get(channel.position) ?? '',
      samples: channel.samples,
      missing: channel.missing,
      closedCycles: channel.closedCycles,
      minKn: channel.minKn,
      maxKn: channel.maxKn,
      maxAt: channel.maxAt?.toISOString() ?? null,
      ...(channel.envelope ? traceOf(decodeEnvelope(channel.envelope), TRACE_POINTS_MAX) : NO_POINTS),
    }));
  }
}

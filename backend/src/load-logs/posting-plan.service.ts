import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { LogReviewDto } from '@stayledger/shared/contracts/load-logs';
import { accountOf, betweenLogsDamage, totalDamage } from '@stayledger/shared/fatigue/account/account-of';
import { dayIn } from '../common/clock/clock.js';
import { holds, type LogOfPart, PartHistory } from '../ledger/part-history.js';
import { type AssessedDetail, assessedDetailsOf } from '../life/detail-models.js';
import { PartDetail } from '../life/part-detail.entity.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { Position } from '../rig/position.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { LoadLog } from './load-log.entity.js';
import { LogChannel } from './log-channel.entity.js';

/** One part a log concerns: it receives the log, or the note says why it does not. */
interface ConcernedPart {
  part: FittedPart;
  position: Position;
  /** All logs of the part including this one; null when the log is not of this part's stretch. */
  logs: LogOfPart[] | null;
  note: string | null;
}

type ReviewedPart = LogReviewDto['parts'][number];
type ReviewedDetail = ReviewedPart['details'][number];

/** Works out what posting a log would do, without writing anything. */
@Injectable()
export class PostingPlanService {
  constructor(
    private readonly em: EntityManager,
    private readonly history: PartHistory,
  ) {}

  /** Per part and detail allowance used before this log and after it, and why it cannot be posted, if it cannot. */
  async review(log: LoadLog): Promise<{ parts: ReviewedPart[]; obstacle: string | null }> {
    const concerned = await this.concernedParts(log);
    const parts: ReviewedPart[] = [];
    for (const one of concerned) parts.push(await this.effectOn(one, log));
    return { parts, obstacle: await this.obstacleAmong(concerned, log) };
  }

  /** Parts that receive the log when it is posted, or why it cannot be posted. */
  async receivers(log: LoadLog): Promise<{ parts: FittedPart[]; obstacle: string | null }> {
    const concerned = await this.concernedParts(log);
    return {
      parts: concerned.flatMap(({ part, logs }) => (logs ? [part] : [])),
      obstacle: await this.obstacleAmong(concerned, log),
    };
  }

  /** In one or two sentences; null when there is none. */
  private async obstacleAmong(concerned: readonly ConcernedPart[], log: LoadLog): Promise<string | null> {
    const undecided = stateObstacle(log);
    if (undecided !== null) return undecided;
    const twin = await this.em.findOne(LoadLog, {
      vessel: log.vessel,
      sha256: log.sha256,
      state: 'posted',
      id: { $ne: log.id },
    });
    if (twin) {
      return `The same file was posted before, as ${twin.fileName}. Set this one aside.`;
    }
    if (concerned.every(({ logs }) => logs === null)) {
      return (
        concerned.find(({ note }) => note !== null)?.note ??
        'No part was fitted in the matched positions. Fit the parts first, or match other positions.'
      );
    }
    for (const { part, position, logs } of concerned) {
      const mine = logs?.find(({ loadLogId }) => loadLogId === log.id);
      if (!logs || !mine) continue;
      if (mine.maxKn !== null && mine.maxKn > part.breakingLoadKn) {
        return `${position.label}: the highest recorded load, ${kn(mine.maxKn)}, is above the breaking load of ${kn(part.breakingLoadKn)}. Check the unit of column ${mine.columnName} and read the log again, or set it aside.`;
      }
      const other = logs.find(
        ({ loadLogId, fromMs, toMs }) => loadLogId !== log.id && fromMs < mine.toMs && mine.fromMs < toMs,
      );
      if (other) {
        return `${position.label}: this log overlaps ${other.fileName}, which is posted. The same hours would be counted twice; set one of them aside.`;
      }
    }
    return null;
  }

  private async concernedParts(log: LoadLog): Promise<ConcernedPart[]> {
    const { fromAt, toAt } = log;
    if (fromAt === null || toAt === null) return [];
    const vessel = await this.em.findOneOrFail(Vessel, log.vessel);
    const days = { fromOn: dayIn(fromAt, vessel.zone), toOn: dayIn(toAt, vessel.zone) };
    const channels = await this.em.find(LogChannel, {
      loadLog: log.id,
      mappingVersion: log.mappingVersion,
      engineVersion: log.engineVersion ?? '',
    });
    const concerned: ConcernedPart[] = [];
    for (const channel of channels) {
      const position = await this.em.findOneOrFail(Position, channel.position);
      const parts = await this.em.find(
        FittedPart,
        { position: channel.position },
        { orderBy: { createdAt: 'asc', id: 'asc' } },
      );
      for (const part of parts) {
        const stretch = await this.history.stretchOf(this.em, part);
        if (holds(stretch, days)) {
          const logs = await this.history.logsOf(this.em, part, log.id);
          concerned.push({ part, position, logs, note: null });
        } else if (part.removedOn === null) {
          const since = stretch.fromOn === null ? '' : ` (${stretch.fromOn})`;
          const note = `${position.label}: this log began before the part was fitted${since}, so nothing is posted to it.`;
          concerned.push({ part, position, logs: null, note });
        }
      }
    }
    return concerned;
  }

  private async effectOn({ part, position, logs, note }: ConcernedPart, log: LoadLog): Promise<ReviewedPart> {
    const base = { partId: part.id, positionLabel: position.label };
    if (logs === null) return { ...base, before: null, after: null, details: [], note };
    const assessed = await assessedDetailsOf(this.em, part.id);
    const details = assessed.map((one) => effectOnDetail(one, logs, log.id));
    const worst = (values: number[]) => (values.length === 0 ? null : Math.max(...values));
    return {
      ...base,
      before: worst(details.map(({ before }) => before)),
      after: worst(details.map(({ after }) => after)),
      details,
      note: await this.notAssessedNote(part.id, assessed),
    };
  }

  private async notAssessedNote(partId: string, assessed: AssessedDetail[]): Promise<string | null> {
    const details = await this.em.find(PartDetail, { fittedPart: partId }, { orderBy: { key: 'asc' } });
    const missing = details.filter(({ id }) => !assessed.some(({ detail }) => detail.id === id));
    if (details.length === 0) return 'Not assessed for fatigue: its calendar decides.';
    if (missing.length === 0) return null;
    return `Not assessed: ${missing.map(({ name }) => name).join(', ')}.`;
  }
}

function effectOnDetail(
  assessed: AssessedDetail,
  logs: readonly LogOfPart[],
  loadLogId: string,
): ReviewedDetail {
  const { id, name, designFatigueFactor: dff } = assessed.detail;
  const after = accountOf(logs, assessed.model);
  const others = logs.filter((log) => log.loadLogId !== loadLogId);
  const between = others.length === 0 ? 0 : betweenLogsDamage(others, assessed.model).damage;
  const recordedByOthers = others.map((log) => after.recorded.get(log.loadLogId) ?? 0);
  return {
    detailId: id,
    name,
    before: dff * totalDamage([...recordedByOthers, between]),
    after: dff * after.total,
    recorded: dff * (after.recorded.get(loadLogId) ?? 0),
    betweenLogs: dff * (after.betweenLogs - between),
  };
}

function stateObstacle(log: LoadLog): string | null {
  switch (log.state) {
    case 'counted':
      return null;
    case 'posted':
      return 'This log is posted to the ledger already.';
    case 'set-aside':
      return 'This log was set aside.';
    case 'failed':
      return 'This log could not be counted. Read it again in another way, or add it anew.';
    default:
      return 'This log is not counted yet.';
  }
}

function kn(load: number): string {
  return `${load.toFixed(1)} kN`;
}

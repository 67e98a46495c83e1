import { LockMode } from '@mikro-orm/core';
import { EntityManager } from '@mikro-orm/postgresql';
import { Inject, Injectable } from '@nestjs/common';
import type {
  CreateLoadLogInput,
  LoadLogDto,
  LogMapping,
  RecountLoadLogInput,
} from '@stayledger/shared/contracts/load-logs';
import type { Permission } from '@stayledger/shared/permissions/permissions';
import { idSchema } from '@stayledger/shared/contracts/values';
import { COUNT_LOAD_LOG } from '@stayledger/shared/queues/load-logs.queue';
import { z } from 'zod';
import { AuditService } from '../audit/audit.service.js';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import {
  NotFoundError,
  StateConflictError,
  StorageFullError,
  VersionConflictError,
} from '../common/errors/app-error.js';
import { newId } from '../common/ids/new-id.js';
import { decodeCursor, type Page, toPage } from '../common/pagination/cursor.js';
import { JobQueue } from '../queue/job-queue.js';
import { LOG_STORAGE, type LogStorage } from '../storage/log-storage.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';
import { ChannelMapping } from './channel-mapping.entity.js';
import { LoadLog } from './load-log.entity.js';
import { LoadLogReplies } from './load-log-replies.js';
import { checkMapping } from './log-mapping.check.js';

/** Kept free on the device, so that a large log cannot stop the rest of the service. */
export const STORAGE_RESERVE_BYTES = 256 * 1024 ** 2;

const CURSOR = z.tuple([idSchema]);

/** Load logs from their announcement to the end of counting; what people decide about them is in `DecisionsService`. */
@Injectable()
export class LoadLogsService {
  constructor(
    private readonly em: EntityManager,
    private readonly reach: VesselReach,
    private readonly replies: LoadLogReplies,
    private readonly jobs: JobQueue,
    private readonly audit: AuditService,
    private readonly clock: Clock,
    @Inject(LOG_STORAGE) private readonly storage: LogStorage,
  ) {}

  async announce(
    me: Principal,
    vesselId: string,
    input: CreateLoadLogInput & { mapping: LogMapping },
  ): Promise<LoadLogDto> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'load-logs:upload');
    await checkMapping(this.em, vessel.id, input.mapping);
    await this.requireRoom(input.sizeBytes);
    const now = this.clock.now();
    const log = this.em.create(LoadLog, {
      id: newId(),
      vessel: vessel.id,
      state: 'receiving',
      fileName: input.fileName,
      sizeBytes: input.sizeBytes,
      receivedBytes: 0,
      mapping: input.mapping,
      mappingVersion: 1,
      findings: [],
      uploadedBy: me.userId,
      createdAt: now,
      updatedAt: now,
    });
    await this.em.persist(log).flush();
    await this.audit.record(this.em, {
      userId: me.userId,
      vesselId: vessel.id,
      action: 'load-log.announced',
      subjectKind: 'load-log',
      subjectId: log.id,
      data: { fileName: log.fileName, sizeBytes: log.sizeBytes },
    });
    return this.replies.one(log);
  }

  async list(
    me: Principal,
    vesselId: string,
    query: { cursor?: string; limit: number },
  ): Promise<Page<LoadLogDto>> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'load-logs:read');
    // Ids made later sort later, so the id alone gives newest first and a stable cursor.
    const last = decodeCursor(query.cursor, CURSOR);
    const older = last === null ? {} : { id: { $lt: last[0] } };
    const logs = await this.em.find(
      LoadLog,
      { vessel: vessel.id, ...older },
      { orderBy: { id: 'desc' }, limit: query.limit + 1 },
    );
    const { rows, nextCursor } = toPage(logs, query.limit, ({ id }) => [id]);
    return { items: await this.replies.many(rows), nextCursor };
  }

  async get(me: Principal, loadLogId: string): Promise<LoadLogDto> {
    return this.replies.one(await this.findOrFail(me, loadLogId, 'load-logs:read'));
  }

  async rememberedMappings(me: Principal, vesselId: string) {
    const vessel = await this.reach.findOrFail(me, vesselId, 'load-logs:read');
    const mappings = await this.em.find(
      ChannelMapping,
      { vessel: vessel.id },
      { orderBy: { columnName: 'asc' } },
    );
    return {
      items: mappings.map(({ columnName, unit, position }) => ({
        column: columnName,
        unit,
        positionId: position,
      })),
    };
  }

  /** Reads a failed or counted log again, in another way. What an earlier count left stays until the new one is there. */
  async recount(me: Principal, loadLogId: string, input: RecountLoadLogInput): Promise<LoadLogDto> {
    const log = await this.lockOrFail(me, loadLogId, 'load-logs:upload', input.version);
    if (log.state !== 'failed' && log.state !== 'counted') {
      throw new StateConflictError(
        `This log is ${log.state}; only a failed or counted log can be read again.`,
        await this.replies.one(log),
      );
    }
    const stored = await this.storage.received({ vesselId: log.vessel, loadLogId: log.id });
    if (!stored?.complete) {
      throw new StateConflictError(
        'The file of this log is not here in full. Add the log anew.',
        await this.replies.one(log),
      );
    }
    await checkMapping(this.em, log.vessel, input.mapping);
    this.em.assign(log, {
      mapping: input.mapping,
      mappingVersion: log.mappingVersion + 1,
      state: 'received',
      failure: null,
      findings: [],
      updatedAt: this.clock.now(),
    });
    await this.em.flush();
    await this.jobs.announce(this.em, {
      kind: COUNT_LOAD_LOG,
      subjectId: log.id,
      vesselId: log.vessel,
      inputVersion: log.mappingVersion,
    });
    await this.audit.record(this.em, {
      userId: me.userId,
      vesselId: log.vessel,
      action: 'load-log.read-again',
      subjectKind: 'load-log',
      subjectId: log.id,
      data: { mappingVersion: log.mappingVersion },
    });
    return this.replies.one(log);
  }

  /** The log and its file, for a download. */
  async fileOf(me: Principal, loadLogId: string): Promise<LoadLog> {
    const log = await this.findOrFail(me, loadLogId, 'load-logs:read');
    const stored = await this.storage.received({ vesselId: log.vessel, loadLogId: log.id });
    if (!stored?.complete) throw new StateConflictError('The file of this log is not here in full.');
    return log;
  }

  async findOrFail(me: Principal, loadLogId: string, permission: Permission): Promise<LoadLog> {
    const log = await this.em.findOne(LoadLog, { id: loadLogId });
    if (!log) throw new NotFoundError();
    await this.reach.findOrFail(me, log.vessel, permission);
    return log;
  }

  /** The log with its row locked, so that two people deciding at once are served one after the other. */
  async lockOrFail(
    me: Principal,
    loadLogId: string,
    permission: Permission,
    version: number,
  ): Promise<LoadLog> {
    const log = await this.findOrFail(me, loadLogId, permission);
    await this.em.lock(log, LockMode.PESSIMISTIC_WRITE);
    await this.em.refresh(log);
    if (log.version !== version) throw new VersionConflictError(await this.replies.one(log));
    return log;
  }

  /** @throws StorageFullError when the announced file would not fit */
  async requireRoom(sizeBytes: number): Promise<void> {
    const free = (await this.storage.freeBytes()) - STORAGE_RESERVE_BYTES;
    if (sizeBytes <= free) return;
    const gib = (bytes: number) => `${(Math.max(bytes, 0) / 1024 ** 3).toFixed(1)} GiB`;
    throw new StorageFullError(
      `The storage of the service has room for ${gib(free)}, and this file has ${gib(sizeBytes)}. Ask the administrator to make room, or pack the file as .csv.gz.`,
    );
  }
}

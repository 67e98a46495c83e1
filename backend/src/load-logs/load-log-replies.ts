import { EntityManager } from '@mikro-orm/postgresql';
import { Inject, Injectable } from '@nestjs/common';
import type { LoadLogDto } from '@stayledger/shared/contracts/load-logs';
import { Job } from '../jobs/job.entity.js';
import { LOG_STORAGE, type LogStorage } from '../storage/log-storage.js';
import { User } from '../users/user.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { LoadLog } from './load-log.entity.js';
import { type SameFile, toLoadLogDto } from './load-log.mapper.js';

/** Gathers what replies about load logs need beside their rows, for one log or a page of them. */
@Injectable()
export class LoadLogReplies {
  constructor(
    private readonly em: EntityManager,
    @Inject(LOG_STORAGE) private readonly storage: LogStorage,
  ) {}

  async one(log: LoadLog): Promise<LoadLogDto> {
    const [dto] = await this.many([log]);
    return dto;
  }

  /** Replies for logs of one vessel, in their order. */
  async many(logs: readonly LoadLog[]): Promise<LoadLogDto[]> {
    if (logs.length === 0) return [];
    const vessel = await this.em.findOneOrFail(Vessel, logs[0].vessel);
    const names = await this.namesOf(logs);
    const jobs = await this.latestJobs(logs);
    const twins = await this.twinsOf(logs);
    return Promise.all(
      logs.map(async (log) =>
        toLoadLogDto(log, {
          vesselName: vessel.name,
          names,
          job: jobs.get(log.id) ?? null,
          sameFileAs: twins.get(log.id) ?? null,
          receivedBytes: log.state === 'receiving' ? await this.arrived(log) : log.receivedBytes,
        }),
      ),
    );
  }

  private async arrived(log: LoadLog): Promise<number> {
    return (await this.storage.received({ vesselId: log.vessel, loadLogId: log.id }))?.bytes ?? 0;
  }

  private async namesOf(logs: readonly LoadLog[]): Promise<Map<string, string>> {
    const ids = logs.flatMap(({ uploadedBy, decidedBy }) => [uploadedBy, ...(decidedBy ? [decidedBy] : [])]);
    const users = await this.em.find(User, { id: { $in: [...new Set(ids)] } });
    return new Map(users.map(({ id, name }) => [id, name]));
  }

  private async latestJobs(logs: readonly LoadLog[]): Promise<Map<string, Job>> {
    const jobs = await this.em.find(
      Job,
      { subjectId: { $in: logs.map(({ id }) => id) } },
      // A log that is read again within one moment: the later input is the later job.
      { orderBy: { createdAt: 'asc', inputVersion: 'asc' }, refresh: true },
    );
    return new Map(jobs.map((job) => [job.subjectId, job]));
  }

  /**
   * For each log, another one of the vessel with the same bytes: the posted one if there is one, else the first. Read
   * as plain rows: the logs replied about must not be touched by a later look, or a reply could mix two states.
   */
  private async twinsOf(logs: readonly LoadLog[]): Promise<Map<string, SameFile>> {
    const hashes = logs.flatMap(({ sha256 }) => (sha256 ? [sha256] : []));
    if (hashes.length === 0) return new Map();
    const same = await this.em.execute<(SameFile & { sha256: string })[]>(
      `select id, state, file_name as "fileName", sha256 from load_log
        where vessel_id = ? and sha256 in (?) order by created_at, id`,
      [logs[0].vessel, hashes],
    );
    const twins = new Map<string, SameFile>();
    for (const log of logs) {
      const others = same.filter(({ id, sha256 }) => id !== log.id && sha256 === log.sha256);
      const twin = others.find(({ state }) => state === 'posted') ?? others.at(0);
      if (twin) twins.set(log.id, twin);
    }
    return twins;
  }
}

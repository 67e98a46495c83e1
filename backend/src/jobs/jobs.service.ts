import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { JobDto } from '@stayledger/shared/contracts/jobs';
import { z } from 'zod';
import type { Principal } from '../auth/principal.js';
import { NotFoundError } from '../common/errors/app-error.js';
import { decodeCursor, toPage, type Page } from '../common/pagination/cursor.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';
import { Job } from './job.entity.js';
import { toJobDto } from './job.mapper.js';

const cursorSchema = z.tuple([z.uuid()]);

@Injectable()
export class JobsService {
  constructor(
    private readonly em: EntityManager,
    private readonly reach: VesselReach,
  ) {}

  /** Newest first; for administrators. Job rows hold ids and no vessel data. */
  async list(query: { cursor?: string; limit: number }): Promise<Page<JobDto>> {
    const before = decodeCursor(query.cursor, cursorSchema);
    const rows = await this.em.find(Job, before ? { id: { $lt: before[0] } } : {}, {
      orderBy: { id: 'desc' },
      limit: query.limit + 1,
    });
    const page = toPage(rows, query.limit, ({ id }) => [id]);
    return { items: page.rows.map(toJobDto), nextCursor: page.nextCursor };
  }

  /** The table of jobs has no row level security, so reach is asked for here. */
  async get(me: Principal, jobId: string): Promise<JobDto> {
    const job = await this.em.findOne(Job, { id: jobId });
    if (!job?.vesselId) throw new NotFoundError();
    await this.reach.findOrFail(me, job.vesselId, 'load-logs:read');
    return toJobDto(job);
  }
}

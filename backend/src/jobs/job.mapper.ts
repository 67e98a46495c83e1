import type { JobDto } from '@stayledger/shared/contracts/jobs';
import type { Job } from './job.entity.js';

export function toJobDto(job: Job): JobDto {
  return {
    id: job.id,
    kind: job.kind,
    subjectId: job.subjectId,
    state: job.state,
    progress: job.progress,
    attempts: job.attempts,
    error: job.lastError,
    createdAt: job.createdAt.toISOString(),
    startedAt: job.startedAt?.toISOString() ?? null,
    finishedAt: job.finishedAt?.toISOString() ?? null,
  };
}

import type { LoadLogDto } from '@stayledger/shared/contracts/load-logs';
import type { Job } from '../jobs/job.entity.js';
import { toJobDto } from '../jobs/job.mapper.js';
import type { LoadLog } from './load-log.entity.js';

/** Another log of the vessel that holds the same bytes. */
export type SameFile = Pick<LoadLog, 'id' | 'state' | 'fileName'>;

/** What a reply says beside the row itself. */
export interface LoadLogContext {
  vesselName: string;
  /** Names by user id. */
  names: ReadonlyMap<string, string>;
  job: Job | null;
  sameFileAs: SameFile | null;
  /** Bytes that have arrived so far; only asked of the storage while a log is being received. */
  receivedBytes: number;
}

export function toLoadLogDto(log: LoadLog, context: LoadLogContext): LoadLogDto {
  const { sameFileAs } = context;
  return {
    id: log.id,
    vesselId: log.vessel,
    vesselName: context.vesselName,
    state: log.state,
    fileName: log.fileName,
    sizeBytes: log.sizeBytes,
    receivedBytes: context.receivedBytes,
    sha256: log.sha256,
    mapping: log.mapping,
    rows: log.rows,
    fromAt: log.fromAt?.toISOString() ?? null,
    toAt: log.toAt?.toISOString() ?? null,
    loggedHours: log.loggedHours,
    sampleRateHz: log.sampleRateHz,
    findings: log.findings,
    failure: log.failure,
    sameFileAs: sameFileAs && {
      id: sameFileAs.id,
      state: sameFileAs.state,
      fileName: sameFileAs.fileName,
    },
    uploadedByName: context.names.get(log.uploadedBy) ?? '',
    decidedByName: log.decidedBy === null ? null : (context.names.get(log.decidedBy) ?? ''),
    decidedAt: log.decidedAt?.toISOString() ?? null,
    decisionReason: log.decisionReason,
    job: context.job && toJobDto(context.job),
    createdAt: log.createdAt.toISOString(),
    version: log.version,
  };
}

import { LockMode } from '@mikro-orm/core';
import { EntityManager } from '@mikro-orm/postgresql';
import { Inject, Injectable, Logger, type OnApplicationBootstrap } from '@nestjs/common';
import { Interval } from '@nestjs/schedule';
import { COUNT_LOAD_LOG } from '@stayledger/shared/queues/load-logs.queue';
import { AuditService } from '../audit/audit.service.js';
import { Clock } from '../common/clock/clock.js';
import { withAccess } from '../database/reach.js';
import { JobQueue } from '../queue/job-queue.js';
import { LOG_STORAGE, type LogStorage, type StorageKey } from '../storage/log-storage.js';
import { sniffLogFile } from '../storage/sniff-log-file.js';
import { LoadLog } from './load-log.entity.js';

/** An upload that was not gone on with for so long is given up. */
export const UPLOAD_EXPIRY_MS = 7 * 24 * 3_600_000;
const SWEEP_EVERY_MS = 60_000;
/** Clocks of file systems are not ours. */
const OVERLAP_MS = 3_600_000;

/** Takes over files whose last byte has arrived, and clears away those that never got so far. */
@Injectable()
export class LogReceiver implements OnApplicationBootstrap {
  private readonly logger = new Logger(LogReceiver.name);
  private sweeping: Promise<void> | null = null;
  /** Zero at start: whatever a crash left behind is looked at once. */
  private checkedUntilMs = 0;

  constructor(
    private readonly em: EntityManager,
    private readonly jobs: JobQueue,
    private readonly audit: AuditService,
    private readonly clock: Clock,
    @Inject(LOG_STORAGE) private readonly storage: LogStorage,
  ) {}

  /** What a crash interrupted is finished at once, and not only when the first interval has gone by. */
  onApplicationBootstrap(): void {
    void this.sweep();
  }

  /**
   * Makes a fully received file durable, judges it by its contents and announces the job that counts it. Does nothing
   * for a log that was taken over before, so it may be repeated after a crash at any point.
   */
  async takeOver(key: StorageKey): Promise<void> {
    const announced = await withAccess(this.em, key, (em) => em.findOne(LoadLog, { id: key.loadLogId }));
    if (announced?.state !== 'receiving') return;
    const stored = await this.storage.complete(key);
    const sniffed = await sniffLogFile(this.storage.read(key));
    const failure =
      stored.sizeBytes !== announced.sizeBytes
        ? {
            code: 'size-differs',
            message: `${stored.sizeBytes} bytes arrived, ${announced.sizeBytes} were announced. Add the log anew.`,
          }
        : sniffed.kind === 'other'
          ? { code: 'not-a-table', message: sniffed.refusal }
          : null;

    await withAccess(this.em, key, async (em) => {
      const log = await em.findOneOrFail(LoadLog, key.loadLogId, { lockMode: LockMode.PESSIMISTIC_WRITE });
      if (log.state !== 'receiving') return;
      em.assign(log, {
        state: failure === null ? 'received' : 'failed',
        receivedBytes: stored.sizeBytes,
        sha256: stored.sha256,
        storageKey: `${key.vesselId}/${key.loadLogId}`,
        failure,
        updatedAt: this.clock.now(),
      });
      await em.flush();
      if (failure === null) {
        await this.jobs.announce(em, {
          kind: COUNT_LOAD_LOG,
          subjectId: log.id,
          vesselId: log.vessel,
          inputVersion: log.mappingVersion,
        });
      }
      await this.audit.record(em, {
        userId: log.uploadedBy,
        vesselId: log.vessel,
        action: failure === null ? 'load-log.received' : 'load-log.refused',
        subjectKind: 'load-log',
        subjectId: log.id,
        data: { sha256: stored.sha256, sizeBytes: stored.sizeBytes },
      });
    });
  }

  /**
   * Gives an unfinished upload up at a person's wish. Once the last byte has arrived there is nothing to cancel: the log
   * is then set aside, and its file stays.
   */
  async cancel(key: StorageKey, userId: string): Promise<void> {
    const cancelled = await withAccess(this.em, key, async (em) => {
      const log = await em.findOne(LoadLog, key.loadLogId, { lockMode: LockMode.PESSIMISTIC_WRITE });
      if (log?.state !== 'receiving') return false;
      em.assign(log, {
        state: 'failed',
        failure: {
          code: 'upload-cancelled',
          message: 'The upload was cancelled and what had arrived was thrown away. Add the log anew.',
        },
        updatedAt: this.clock.now(),
      });
      await em.flush();
      await this.audit.record(em, {
        userId,
        vesselId: log.vessel,
        action: 'load-log.upload-cancelled',
        subjectKind: 'load-log',
        subjectId: log.id,
        data: {},
      });
      return true;
    });
    if (cancelled) await this.storage.discard(key);
  }

  @Interval(SWEEP_EVERY_MS)
  sweep(): Promise<void> {
    this.sweeping ??= this.sweepOnce()
      .catch((error: unknown) => this.logger.warn(`sweep of received files: ${String(error)}`))
      .finally(() => {
        this.sweeping = null;
      });
    return this.sweeping;
  }

  /** Finishes what a crash interrupted between the last byte and the row, and clears away what nobody goes on with. */
  private async sweepOnce(): Promise<void> {
    const now = this.clock.now().getTime();
    let failures = 0;
    const each = async (keys: StorageKey[], work: (key: StorageKey) => Promise<void>): Promise<void> => {
      for (const key of keys) {
        // One file that cannot be read must not keep the others waiting.
        await work(key).catch((error: unknown) => {
          failures += 1;
          this.logger.warn(`the file of load log ${key.loadLogId}: ${String(error)}`);
        });
      }
    };
    // A clock that was set back must not hide what arrived since.
    const since = Math.min(this.checkedUntilMs, now - OVERLAP_MS);
    await each(await this.storage.completedSince(since), async (key) => {
      const log = await this.logOf(key);
      if (log?.state === 'receiving') await this.takeOver(key);
    });
    await each(await this.storage.halfReceivedBefore(now), async (key) => {
      const log = await this.logOf(key);
      const received = await this.storage.received(key);
      if (log?.state === 'receiving' && received?.bytes === log.sizeBytes) await this.takeOver(key);
      // Cancelled, and the process ended before the file was gone.
      else if (log !== null && log.state !== 'receiving') await this.storage.discardHalf(key);
    });
    await each(await this.storage.halfReceivedBefore(now - UPLOAD_EXPIRY_MS), (key) => this.giveUp(key));
    if (failures === 0) this.checkedUntilMs = now - OVERLAP_MS;
  }

  private async giveUp(key: StorageKey): Promise<void> {
    await withAccess(this.em, key, async (em) => {
      const log = await em.findOne(LoadLog, key.loadLogId, { lockMode: LockMode.PESSIMISTIC_WRITE });
      if (log?.state !== 'receiving') return;
      em.assign(log, {
        state: 'failed',
        failure: {
          code: 'upload-abandoned',
          message: 'The upload was not finished within seven days and was cleared away. Add the log anew.',
        },
        updatedAt: this.clock.now(),
      });
    });
    await this.storage.discardHalf(key);
    this.logger.log(`cleared away the half-received file of load log ${key.loadLogId}`);
  }

  private logOf(key: StorageKey): Promise<LoadLog | null> {
    return withAccess(this.em, key, (em) => em.findOne(LoadLog, { id: key.loadLogId }));
  }
}

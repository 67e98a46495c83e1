import { createHash } from 'node:crypto';
import { LockMode } from '@mikro-orm/core';
import type { EntityManager } from '@mikro-orm/postgresql';
import { AuditEvent } from '@stayledger/backend/audit/audit-event.entity';
import { ChannelMapping } from '@stayledger/backend/load-logs/channel-mapping.entity';
import { LoadLog } from '@stayledger/backend/load-logs/load-log.entity';
import { StoredSpectrum } from '@stayledger/backend/load-logs/load-spectrum.entity';
import { type Clock, FittedPart, newId, Vessel, withAccess } from '@stayledger/backend/persistence';
import { encodeEnvelope } from '@stayledger/backend/storage/envelope-codec';
import type { LogStorage } from '@stayledger/backend/storage/log-storage';
import type { LogFindingDto } from '@stayledger/shared/contracts/load-logs';
import { ENGINE_VERSION } from '@stayledger/shared/fatigue/engine-version';
import type { LoadLogConfig, LogFinding } from '@stayledger/shared/fatigue/load-history/load-log';
import { endJob, type HeldJob, type JobFailure } from '../common/job-leases.js';
import { whileHeld } from '../common/while-held.js';
import type { CountOutcome, CountedChannel } from './count-outcome.js';
import type { CountingPool } from './counting-pool.js';
import { countingStepKn } from './counting-step.js';
import { zoneOffsets } from './zone-offsets.js';

/** Room for counted cycles, shared among the channels of a log, so that a hostile file cannot fill the memory. */
const CYCLES_IN_MEMORY = 8_000_000;
const CYCLES_PER_CHANNEL_MAX = 2_000_000;

export interface CountingDeps {
  em: EntityManager;
  storage: LogStorage;
  pool: Pick<CountingPool, 'count'>;
  clock: Clock;
}

type Counted = Extract<CountOutcome, { ok: true }>;

/**
 * Counts the load log of a job that this process holds: reads its file in a thread, and writes the result, the state of
 * the log and the end of the job in one transaction. Run twice it does the same as once.
 *
 * @throws LeaseLostError when another worker took over meanwhile: nothing was written
 * @throws whatever keeps the machine from reading or writing: worth another try
 */
export async function countLoadLog(deps: CountingDeps, job: HeldJob, signal: AbortSignal): Promise<void> {
  const begun = await withAccess(deps.em, { vesselId: job.vesselId }, (em) => begin(em, job));
  if (begun === null) {
    await withAccess(deps.em, { vesselId: job.vesselId }, (em) => endJob(em, job, 'cancelled'));
    return;
  }
  const path = await deps.storage.localPath({ vesselId: job.vesselId, loadLogId: job.subjectId });
  const outcome = await whileHeld(deps.em, job, signal, ({ signal: ending, onProgress }) =>
    deps.pool.count(path, begun.config, {
      signal: ending,
      onProgress: (bytesRead) => onProgress(begun.sizeBytes > 0 ? bytesRead / begun.sizeBytes : 0),
    }),
  );
  if (outcome.ok) await keep(deps, job, begun, outcome);
  else await refuse(deps, job, { code: outcome.code, message: outcome.message });
}

/** Ends a job that cannot succeed, and the log with it, in words a person can act on. */
export async function refuse(
  deps: Pick<CountingDeps, 'em' | 'clock'>,
  job: HeldJob,
  failure: JobFailure,
): Promise<void> {
  await withAccess(deps.em, { vesselId: job.vesselId }, async (em) => {
    const log = await em.findOne(LoadLog, job.subjectId, { lockMode: LockMode.PESSIMISTIC_WRITE });
    if (log !== null && isInput(log, job)) {
      em.assign(log, { state: 'failed', failure, updatedAt: deps.clock.now() });
      await em.flush();
      await audit(em, deps.clock, log, 'load-log.count-failed', { code: failure.code });
    }
    await endJob(em, job, 'failed', failure);
  });
}

interface Begun {
  sizeBytes: number;
  config: LoadLogConfig;
}

/** Marks the log as being counted and gathers how to read it; null when there is nothing to count any more. */
async function begin(em: EntityManager, job: HeldJob): Promise<Begun | null> {
  const log = await em.findOne(LoadLog, job.subjectId, { lockMode: LockMode.PESSIMISTIC_WRITE });
  if (log === null || !isInput(log, job)) return null;
  if (log.state !== 'counting') {
    log.state = 'counting';
    await em.flush();
  }
  const vessel = await em.findOneOrFail(Vessel, log.vessel);
  const positionIds = log.mapping.channels.map(({ positionId }) => positionId);
  const parts = await em.find(FittedPart, { position: { $in: positionIds } });
  return { sizeBytes: log.receivedBytes, config: configOf(log, vessel.zone, parts) };
}

function isInput(log: LoadLog, job: HeldJob): boolean {
  return (log.state === 'received' || log.state === 'counting') && log.mappingVersion === job.inputVersion;
}

function configOf(log: LoadLog, zone: string, parts: readonly FittedPart[]): LoadLogConfig {
  const { mapping } = log;
  const cycles = Math.min(CYCLES_PER_CHANNEL_MAX, Math.floor(CYCLES_IN_MEMORY / mapping.channels.length));
  return {
    delimiter: mapping.delimiter,
    decimalComma: mapping.decimalComma,
    time:
      'column' in mapping.time
        ? {
            column: mapping.time.column,
            format: mapping.time.format,
            utcOffsetMinutesForNaive: mapping.time.naiveOffsetMinutes,
          }
        : mapping.time,
    zoneOffsets: zoneOffsets(zone),
    channels: mapping.channels.map(({ column, unit, positionId }) => {
      const served = parts.filter(({ position }) => position === positionId);
      const breakingLoads = served.map(({ breakingLoadKn }) => breakingLoadKn);
      const step = countingStepKn(breakingLoads);
      return served.length === 0
        ? { column, unit, step }
        : { column, unit, step, limitKn: Math.min(...breakingLoads) };
    }),
    bounds: { cycles, residuePoints: cycles },
  };
}

/** Result, state of the log and end of the job: all or nothing, and nothing without the lease. */
async function keep(deps: CountingDeps, job: HeldJob, begun: Begun, counted: Counted): Promise<void> {
  await withAccess(deps.em, { vesselId: job.vesselId }, async (em) => {
    const log = await em.findOne(LoadLog, job.subjectId, { lockMode: LockMode.PESSIMISTIC_WRITE });
    if (log === null || !isInput(log, job)) {
      await endJob(em, job, 'cancelled');
      return;
    }
    await endJob(em, job, 'done');
    const now = deps.clock.now();
    for (const [i, channel] of counted.channels.entries()) {
      await insertChannel(em, log, log.mapping.channels[i], channel, now);
    }
    await rememberMapping(em, log, now);
    em.assign(log, {
      state: 'counted',
      rows: counted.rows,
      fromAt: instant(counted.fromMs),
      toAt: instant(counted.toMs),
      loggedHours: counted.loggedHours,
      sampleRateHz: counted.sampleRateHz,
      findings: [...counted.findings.map(toDto), roundingFinding(begun.config, counted)],
      engineVersion: ENGINE_VERSION,
      failure: null,
      updatedAt: now,
    });
    await em.flush();
    await audit(em, deps.clock, log, 'load-log.counted', {
      rows: counted.rows,
      engineVersion: ENGINE_VERSION,
    });
  });
}

async function insertChannel(
  em: EntityManager,
  log: LoadLog,
  mapped: LoadLog['mapping']['channels'][number],
  channel: CountedChannel,
  now: Date,
): Promise<void> {
  const id = newId();
  const [inserted] = await em.execute<{ id: string }[]>(
    `insert into log_channel (id, vessel_id, load_log_id, mapping_version, engine_version, position_id, column_name,
       unit, step_kn, samples, missing, turning_points, closed_cycles, min_kn, max_kn, max_at, envelope, created_at)
     values (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?)
     on conflict (load_log_id, mapping_version, engine_version, column_name) do nothing returning id`,
    [
      id,
      log.vessel,
      log.id,
      log.mappingVersion,
      ENGINE_VERSION,
      mapped.positionId,
      mapped.column,
      mapped.unit,
      channel.step,
      channel.samples,
      channel.missing,
      channel.turningPoints,
      channel.closedCycles,
      channel.minKn,
      channel.maxKn,
      instant(channel.maxAtMs),
      encodeEnvelope(channel.envelope),
      now,
    ],
  );
  // The same log, mapping and engine were counted before: the same result stands already.
  if (!inserted) return;
  const data = Buffer.from(channel.spectrum);
  await em.insert(StoredSpectrum, {
    logChannel: id,
    vessel: log.vessel,
    format: data[0],
    data,
    sha256: createHash('sha256').update(data).digest('hex'),
  });
}

async function rememberMapping(em: EntityManager, log: LoadLog, now: Date): Promise<void> {
  for (const { column, unit, positionId } of log.mapping.channels) {
    const known = await em.findOne(ChannelMapping, { vessel: log.vessel, columnName: column });
    if (known) em.assign(known, { unit, position: positionId, updatedAt: now });
    else {
      em.persist(
        em.create(ChannelMapping, {
          id: newId(),
          vessel: log.vessel,
          columnName: column,
          unit,
          position: positionId,
          updatedAt: now,
        }),
      );
    }
  }
}

function toDto(finding: LogFinding): LogFindingDto {
  return {
    code: finding.code,
    severity: finding.severity,
    column: finding.column ?? null,
    fromAt: instant(finding.fromMs ?? null)?.toISOString() ?? null,
    toAt: instant(finding.toMs ?? null)?.toISOString() ?? null,
    line: finding.line ?? null,
    count: finding.count,
    message: finding.message,
    action: finding.action,
  };
}

/** Every count on a grid says how fine the grid was and what it can have changed. */
function roundingFinding({ channels }: LoadLogConfig, counted: Counted): LogFindingDto {
  const steps = [...new Set(counted.channels.map(({ step }) => step))].sort((a, b) => a - b);
  const shares = counted.channels.flatMap(({ step }, i) => {
    const { limitKn } = channels[i];
    return limitKn === undefined ? [] : [limitKn / step];
  });
  const against =
    shares.length === 0 ? '' : `, 1/${Math.floor(Math.min(...shares))} of the lowest breaking load or finer`;
  const largest = Math.max(...counted.channels.map(({ roundingShare }) => roundingShare));
  return {
    code: 'rounding',
    severity: 'info',
    column: null,
    fromAt: null,
    toAt: null,
    line: null,
    count: counted.channels.length,
    message: `Loads were counted in steps of ${steps.join(' and ')} kN${against}.`,
    action: `By estimate this changes the damage by ${percent(largest)}.`,
  };
}

function percent(share: number): string {
  return share < 0.0001 ? 'less than 0.01 %' : `${(100 * share).toFixed(2)} %`;
}

function instant(ms: number | null): Date | null {
  return ms === null ? null : new Date(ms);
}

async function audit(
  em: EntityManager,
  clock: Clock,
  log: LoadLog,
  action: string,
  data: Record<string, unknown>,
): Promise<void> {
  await em.insert(AuditEvent, {
    id: newId(),
    at: clock.now(),
    user: null,
    vesselId: log.vessel,
    action,
    subjectKind: 'load-log',
    subjectId: log.id,
    data,
  });
}

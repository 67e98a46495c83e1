import { createHash } from 'node:crypto';
import type { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { LogOfAccount } from '@stayledger/shared/fatigue/account/log-of-account';
import { decodeSpectrum } from '@stayledger/shared/fatigue/rainflow/spectrum-codec';
import { dayIn } from '../common/clock/clock.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';

/** A log of a part's own stretch, with the spectrum of the channel that served its position. */
export interface LogOfPart extends LogOfAccount {
  fileName: string;
  toMs: number;
  /** First and last day in the vessel's zone. */
  fromOn: string;
  toOn: string;
  loggedHours: number;
  /** Of the file as it was received. */
  logSha256: string | null;
  mappingVersion: number;
  spectrumSha256: string;
  columnName: string;
  unit: string;
  stepKn: number;
  maxKn: number | null;
}

interface Row {
  load_log_id: string;
  file_name: string;
  from_at: Date;
  to_at: Date;
  logged_hours: number;
  log_sha256: string | null;
  mapping_version: number;
  column_name: string;
  unit: string;
  step_kn: number;
  max_kn: number | null;
  data: Buffer;
  sha256: string;
}

/** The days a part was in its position; null: not bounded. */
export interface Stretch {
  fromOn: string | null;
  toOn: string | null;
}

/** What is known of the loads a fitted part carried. */
@Injectable()
export class PartHistory {
  /**
   * Posted logs of the part's stretch in time order.
   *
   * @param alsoLogId a counted log to be treated as if it were posted, for a dry run or while it is being posted
   */
  async logsOf(em: EntityManager, part: FittedPart, alsoLogId: string | null = null): Promise<LogOfPart[]> {
    const vessel = await em.findOneOrFail(Vessel, part.vessel);
    const stretch = await this.stretchOf(em, part);
    const rows = await em.execute<Row[]>(
      `select l.id as load_log_id, l.file_name, l.from_at, l.to_at, l.logged_hours,
              l.sha256 as log_sha256, l.mapping_version, c.column_name, c.unit, c.step_kn, c.max_kn, s.data, s.sha256
         from load_log l
         join log_channel c on c.load_log_id = l.id and c.mapping_version = l.mapping_version
                           and c.engine_version = l.engine_version
         join load_spectrum s on s.log_channel_id = c.id
        where c.position_id = ? and (l.state = 'posted' or l.id = ?) and l.from_at is not null
        order by l.from_at, l.id`,
      [part.position, alsoLogId],
    );
    return rows.map((row) => logOf(row, vessel.zone)).filter((log) => holds(stretch, log));
  }

  /**
   * The stretch of a part. Where nobody knows when it was fitted, it begins when its predecessor in the position came
   * off. A log of the very day of a change is charged to both parts: which of them carried it is not known.
   */
  async stretchOf(em: EntityManager, part: FittedPart): Promise<Stretch> {
    if (part.fittedOn !== null) return { fromOn: part.fittedOn, toOn: part.removedOn };
    const [row] = await em.execute<{ removed_on: string | null }[]>(
      `select max(removed_on)::text as removed_on from fitted_part where position_id = ? and id <> ? and created_at <= ?`,
      [part.position, part.id, part.createdAt],
    );
    return { fromOn: row?.removed_on ?? null, toOn: part.removedOn };
  }
}

/** True when the whole log lies within the stretch. A log that reaches over its ends belongs to neither side. */
export function holds(stretch: Stretch, log: Pick<LogOfPart, 'fromOn' | 'toOn'>): boolean {
  return (
    (stretch.fromOn === null || log.fromOn >= stretch.fromOn) &&
    (stretch.toOn === null || log.toOn <= stretch.toOn)
  );
}

function logOf(row: Row, zone: string): LogOfPart {
  const actual = createHash('sha256').update(row.data).digest('hex');
  if (actual !== row.sha256) {
    throw new Error(`The stored spectrum of column ${row.column_name} of log ${row.load_log_id} is damaged.`);
  }
  const fromAt = new Date(row.from_at);
  const toAt = new Date(row.to_at);
  return {
    loadLogId: row.load_log_id,
    fileName: row.file_name,
    fromMs: fromAt.getTime(),
    toMs: toAt.getTime(),
    fromOn: dayIn(fromAt, zone),
    toOn: dayIn(toAt, zone),
    loggedHours: row.logged_hours,
    logSha256: row.log_sha256,
    mappingVersion: row.mapping_version,
    columnName: row.column_name,
    unit: row.unit,
    stepKn: row.step_kn,
    maxKn: row.max_kn,
    spectrum: decodeSpectrum(row.data),
    spectrumSha256: row.sha256,
  };
}

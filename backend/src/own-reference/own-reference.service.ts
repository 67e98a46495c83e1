import { createHash } from 'node:crypto';
import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import { can } from '@stayledger/shared/permissions/permissions';
import { AuditService } from '../audit/audit.service.js';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { InvalidRequestError, NotFoundError, VersionConflictError } from '../common/errors/app-error.js';
import { newId } from '../common/ids/new-id.js';
import { canonicalJson, type CanonicalValue } from '../ledger/canonical-json.js';

export type ReferenceTable = 'curve' | 'construction';

/** What both kinds have in common; the rest is in `data` as the contracts of curves and constructions say. */
interface ReferenceData {
  id: string;
  version: number;
  name: string;
}

export interface ReferenceFirm {
  id: string;
  name: string;
}

/** A firm's own rows of the reference data. A row is never changed: a correction is a new version beside it. */
@Injectable()
export class OwnReferenceService {
  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
    private readonly audit: AuditService,
  ) {}

  /** The firm a new row belongs to: the one named, or the only one of the person's that may add. */
  firmOf(me: Principal, wanted: string | undefined): ReferenceFirm {
    const firms = new Map(
      me.capacities.flatMap(({ firmId, firmName, role }) =>
        firmId !== null && can(role, 'curves:add') ? [[firmId, { id: firmId, name: firmName ?? '' }]] : [],
      ),
    );
    const chosen = wanted === undefined ? [...firms.values()] : [firms.get(wanted)].filter((firm) => !!firm);
    if (chosen.length === 1) return chosen[0];
    throw new InvalidRequestError({
      firmId: [
        chosen.length === 0
          ? 'Choose a firm of yours that may add data.'
          : 'Say which of your firms adds it.',
      ],
    });
  }

  /** An id nobody else can have: rows of all firms share one key, and an id taken must not tell of another firm. */
  newReferenceId(): string {
    return `own-${newId()}`;
  }

  async add(me: Principal, table: ReferenceTable, firm: ReferenceFirm, row: ReferenceData): Promise<void> {
    await this.insert(table, firm, row);
    await this.record(me, table, `${table}.added`, row);
  }

  /**
   * Adds the version after `basedOn`.
   *
   * @throws NotFoundError where the firm of the person has no such row; rows of the product are not theirs to correct
   * @throws VersionConflictError when somebody else corrected it in between
   */
  async revise<Row extends ReferenceData>(
    me: Principal,
    table: ReferenceTable,
    id: string,
    basedOn: number,
    next: (version: number) => Row,
  ): Promise<{ row: Row; firm: ReferenceFirm }> {
    const [newest]: { version: number; firm_id: string | null; data: Row }[] = await this.em.execute(
      `select version, firm_id, data from ${table} where id = ? order by version desc limit 1`,
      [id],
    );
    if (!newest?.firm_id || !belongsTo(me, newest.firm_id)) throw new NotFoundError();
    const firm = this.firmOf(me, newest.firm_id);
    if (newest.version !== basedOn) throw new VersionConflictError({ ...newest.data, firm });
    const row = next(basedOn + 1);
    // Two people correcting at once: the second one finds the version taken.
    if (!(await this.insert(table, firm, row))) throw new VersionConflictError({ ...newest.data, firm });
    await this.record(me, table, `${table}.corrected`, row);
    return { row, firm };
  }

  private async insert(table: ReferenceTable, firm: ReferenceFirm, row: ReferenceData): Promise<boolean> {
    const data = JSON.stringify(row);
    const inserted: unknown[] = await this.em.execute(
      `insert into ${table} (id, version, firm_id, name, data, data_hash, created_at)
        values (?, ?, ?, ?, ?, ?, ?) on conflict do nothing returning id`,
      [
        row.id,
        row.version,
        firm.id,
        row.name,
        data,
        createHash('sha256')
          .update(canonicalJson(JSON.parse(data) as CanonicalValue))
          .digest('hex'),
        this.clock.now(),
      ],
    );
    return inserted.length > 0;
  }

  private async record(me: Principal, table: ReferenceTable, action: string, row: ReferenceData) {
    await this.audit.record(this.em, {
      action,
      subjectKind: table,
      subjectId: row.id,
      userId: me.userId,
      data: { version: row.version },
    });
  }
}

function belongsTo(me: Principal, firmId: string): boolean {
  return me.capacities.some((capacity) => capacity.firmId === firmId && can(capacity.role, 'curves:add'));
}

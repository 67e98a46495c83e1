import type { EntityManager, RequiredEntityData } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import {
  betweenLogsDamage,
  recordedDamage,
  totalDamage,
} from '@stayledger/shared/fatigue/account/account-of';
import { ENGINE_VERSION } from '@stayledger/shared/fatigue/engine-version';
import { Clock } from '../common/clock/clock.js';
import { newId } from '../common/ids/new-id.js';
import { asStored, type AssessedDetail, assessedDetailsOf } from '../life/detail-models.js';
import { PartDetail } from '../life/part-detail.entity.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import type { CanonicalValue } from './canonical-json.js';
import { type EntryContent, entryHash, FIRST_HASH } from './entry-hash.js';
import { type EntryKind, LedgerEntry } from './ledger-entry.entity.js';
import { type LogOfPart, PartHistory } from './part-history.js';

/**
 * An amount the account should hold. What it is made from is known at once; the damage is worked out only where an
 * entry has to be written, so that posting the hundredth log of a life costs no more than posting the second.
 */
interface Amount {
  kind: Extract<EntryKind, 'recorded' | 'between-logs'>;
  loadLogId: string | null;
  damage: () => number;
  basis: { [key: string]: CanonicalValue };
}

/** How the account of a detail differs from what it should hold. */
export interface AccountDifference {
  detail: PartDetail;
  assessed: AssessedDetail | null;
  /** All its entries, ascending. */
  earlier: LedgerEntry[];
  /** Standing entries that no longer hold. */
  outdated: LedgerEntry[];
  missing: Amount[];
}

/**
 * Keeps the accounts of fitted parts. Entries are only ever added: what no longer holds is reversed by a further entry
 * and written anew.
 */
@Injectable()
export class AccountService {
  constructor(
    private readonly history: PartHistory,
    private readonly clock: Clock,
  ) {}

  /**
   * Brings the account of a part to what its posted logs and its details say, in the running transaction. Doing it
   * again changes nothing. The caller holds the row of the part locked.
   *
   * @param why stands in every reversal this makes
   * @returns number of entries written
   */
  async settle(
    em: EntityManager,
    part: FittedPart,
    userId: string | null,
    why: string | null = null,
  ): Promise<number> {
    let written = 0;
    for (const difference of await this.differences(em, part)) {
      written += await this.settleDetail(em, difference, userId, why);
    }
    return written;
  }

  /** What would have to be reversed and written for the account of a part to say what its logs and details say. */
  async differences(em: EntityManager, part: FittedPart): Promise<AccountDifference[]> {
    const logs = await this.history.logsOf(em, part);
    const assessed = new Map((await assessedDetailsOf(em, part.id)).map((one) => [one.detail.id, one]));
    const details = await em.find(PartDetail, { fittedPart: part.id }, { orderBy: { key: 'asc' } });
    const differences: AccountDifference[] = [];
    for (const detail of details) {
      const one = assessed.get(detail.id) ?? null;
      const earlier = await em.find(LedgerEntry, { partDetail: detail.id }, { orderBy: { sequence: 'asc' } });
      const wanted = new Map(
        (one ? amountsOf(logs, one) : []).map((amount) => [keyOf(amount.kind, amount.loadLogId), amount]),
      );
      const outdated = standingAmong(earlier).filter((entry) => {
        const amount = wanted.get(keyOf(entry.kind, entry.loadLog));
        if (!amount || !sameBasis(entry, amount)) return true;
        wanted.delete(keyOf(entry.kind, entry.loadLog));
        return false;
      });
      if (outdated.length === 0 && wanted.size === 0) continue;
      differences.push({ detail, assessed: one, earlier, outdated, missing: [...wanted.values()] });
    }
    return differences;
  }

  /** Design damage of each detail of a part by its standing entries; details without entries are left out. */
  async damages(em: EntityManager, partId: string): Promise<Map<string, number>> {
    const byDetail = new Map<string, number[]>();
    const entries = await em.find(LedgerEntry, { fittedPart: partId }, { orderBy: { sequence: 'asc' } });
    for (const entry of standingAmong(entries)) {
      byDetail.set(entry.partDetail, [...(byDetail.get(entry.partDetail) ?? []), entry.damage]);
    }
    return new Map([...byDetail].map(([detailId, amounts]) => [detailId, totalDamage(amounts)]));
  }

  private async settleDetail(
    em: EntityManager,
    { detail, assessed, earlier, outdated, missing }: AccountDifference,
    userId: string | null,
    why: string | null,
  ): Promise<number> {
    const chain = new Chain(detail, earlier.at(-1) ?? null);
    const postedAt = this.clock.now();
    for (const entry of outdated) {
      chain.add({
        kind: 'reversal',
        loadLogId: entry.loadLog,
        reversesId: entry.id,
        damage: 0 - entry.damage,
        curve: entry.curve,
        basis: { reverses: entry.kind, ...(why === null ? {} : { reason: why }) },
        postedAt,
        userId,
      });
    }
    for (const amount of missing) {
      if (assessed === null) throw new Error(`Detail ${detail.id} has amounts and no curve`);
      chain.add({
        kind: amount.kind,
        loadLogId: amount.loadLogId,
        damage: amount.damage(),
        basis: { ...amount.basis, edition: 1 + earlier.filter((entry) => sameKey(entry, amount)).length },
        reversesId: null,
        curve: [assessed.curve.id, assessed.curve.version],
        postedAt,
        userId,
      });
    }
    for (const entry of chain.added) em.persist(em.create(LedgerEntry, entry));
    await em.flush();
    return chain.added.length;
  }
}

/** Entries that count: neither reversals nor reversed. */
export function standingAmong(entries: readonly LedgerEntry[]): LedgerEntry[] {
  const reversed = new Set(entries.map((entry) => entry.reverses).filter((id) => id !== null));
  return entries.filter((entry) => entry.kind !== 'reversal' && !reversed.has(entry.id));
}

/** The amounts of one detail after the given logs. */
function amountsOf(logs: readonly LogOfPart[], { detail, model, modelSha256 }: AssessedDetail): Amount[] {
  if (logs.length === 0) return [];
  // The inputs themselves stand in the entry, so that its amount can be worked out again after the detail has changed.
  const inputs = asStored(detail.model.inputs);
  const described = { detailVersion: detail.version, modelSha256, inputs };
  const recorded = logs.map((log): Amount => ({
    kind: 'recorded',
    loadLogId: log.loadLogId,
    damage: () => recordedDamage(log, model).damage,
    basis: {
      ...described,
      logSha256: log.logSha256,
      mappingVersion: log.mappingVersion,
      column: log.columnName,
      unit: log.unit,
      spectrumSha256: log.spectrumSha256,
      stepKn: log.stepKn,
    },
  }));
  const spectra = logs.map((log) => log.spectrumSha256);
  return [
    ...recorded,
    {
      kind: 'between-logs',
      loadLogId: null,
      damage: () => betweenLogsDamage(logs, model).damage,
      basis: { ...described, residuesOf: spectra },
    },
  ];
}

/** An entry stands for as long as it was computed from the same spectra with the same model. */
function sameBasis(entry: LedgerEntry, amount: Amount): boolean {
  const basis = entry.basis as { [key: string]: CanonicalValue };
  return (['modelSha256', 'spectrumSha256', 'residuesOf'] as const).every(
    (key) => JSON.stringify(basis[key] ?? null) === JSON.stringify(amount.basis[key] ?? null),
  );
}

function keyOf(kind: EntryKind, loadLogId: string | null): string {
  return `${kind}:${loadLogId ?? ''}`;
}

function sameKey(entry: LedgerEntry, amount: Amount): boolean {
  return keyOf(entry.kind, entry.loadLog) === keyOf(amount.kind, amount.loadLogId);
}

interface NewEntry {
  kind: EntryKind;
  loadLogId: string | null;
  reversesId: string | null;
  damage: number;
  curve: [string, number];
  basis: CanonicalValue;
  postedAt: Date;
  userId: string | null;
}

/** Numbers and chains the entries added to one detail. */
class Chain {
  readonly added: RequiredEntityData<LedgerEntry>[] = [];
  #sequence: number;
  #hash: string;

  constructor(
    private readonly detail: PartDetail,
    last: LedgerEntry | null,
  ) {
    this.#sequence = last?.sequence ?? 0;
    this.#hash = last?.hash ?? FIRST_HASH;
  }

  add(entry: NewEntry): void {
    this.#sequence += 1;
    const content: EntryContent = {
      id: newId(),
      vesselId: this.detail.vessel,
      partId: this.detail.fittedPart,
      detailId: this.detail.id,
      sequence: this.#sequence,
      kind: entry.kind,
      loadLogId: entry.loadLogId,
      reversesId: entry.reversesId,
      damage: entry.damage,
      curveId: entry.curve[0],
      curveVersion: entry.curve[1],
      engineVersion: ENGINE_VERSION,
      basis: entry.basis,
      postedById: entry.userId,
      postedAt: entry.postedAt.toISOString(),
    };
    const previousHash = this.#hash;
    this.#hash = entryHash(content, previousHash);
    this.added.push({
      id: content.id,
      vessel: content.vesselId,
      fittedPart: content.partId,
      partDetail: content.detailId,
      sequence: content.sequence,
      kind: content.kind as EntryKind,
      loadLog: content.loadLogId,
      reverses: content.reversesId,
      damage: content.damage,
      curve: entry.curve,
      engineVersion: content.engineVersion,
      basis: content.basis,
      postedBy: content.postedById,
      postedAt: entry.postedAt,
      previousHash,
      hash: this.#hash,
    });
  }
}

/** The content of a stored entry, as its hash covers it. */
export function contentOf(entry: LedgerEntry): EntryContent {
  return {
    id: entry.id,
    vesselId: entry.vessel,
    partId: entry.fittedPart,
    detailId: entry.partDetail,
    sequence: entry.sequence,
    kind: entry.kind,
    loadLogId: entry.loadLog,
    reversesId: entry.reverses,
    damage: entry.damage,
    curveId: entry.curve[0],
    curveVersion: entry.curve[1],
    engineVersion: entry.engineVersion,
    basis: entry.basis,
    postedById: entry.postedBy,
    postedAt: entry.postedAt.toISOString(),
  };
}

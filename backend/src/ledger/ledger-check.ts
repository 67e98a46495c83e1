import { createHash } from 'node:crypto';
import type { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { LedgerCheckDto, LedgerDifferenceDto } from '@stayledger/shared/contracts/ledger';
import { betweenLogsDamage, recordedDamage } from '@stayledger/shared/fatigue/account/account-of';
import type { LogOfAccount } from '@stayledger/shared/fatigue/account/log-of-account';
import type { ReferenceCurve } from '@stayledger/shared/fatigue/curves/curve';
import type { DetailModel } from '@stayledger/shared/fatigue/damage/detail-model';
import { ENGINE_VERSION } from '@stayledger/shared/fatigue/engine-version';
import { decodeSpectrum } from '@stayledger/shared/fatigue/rainflow/spectrum-codec';
import { detailModelOf } from '@stayledger/shared/rig/detail-model-of';
import type { DetailInputs } from '@stayledger/shared/rig/part-detail';
import { Clock } from '../common/clock/clock.js';
import { Curve } from '../curves/curve.entity.js';
import { asStored, modelSha256Of } from '../life/detail-models.js';
import { PartDetail } from '../life/part-detail.entity.js';
import { LoadLog } from '../load-logs/load-log.entity.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { Position } from '../rig/position.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { AccountService, contentOf } from './account.service.js';
import type { CanonicalValue } from './canonical-json.js';
import { entryHash, FIRST_HASH } from './entry-hash.js';
import { LedgerEntry } from './ledger-entry.entity.js';

/** Relative difference from which two amounts are called different: far above rounding, far below any meaning. */
const AMOUNT_TOLERANCE = 1e-12;

interface StoredBytes {
  data: Buffer;
  sha256: string;
}

/** A part under check, with what its entries may name. */
interface PartUnderCheck {
  part: FittedPart;
  label: string;
  details: Map<string, PartDetail>;
  /** Stored spectra of the part's position by the hash the table gives them. */
  spectra: Map<string, StoredBytes>;
  logHashes: Map<string, string | null>;
}

type Basis = { readonly [key: string]: CanonicalValue };

/** An amount that cannot be worked out again: no sign of a change by itself. */
class NotRecomputable extends Error {}
/** Something an entry names that is not what it was. */
class Differs extends Error {}

/** Reads a ledger again from its first entry, and says exactly what differs. Writes nothing. */
@Injectable()
export class LedgerCheck {
  constructor(
    private readonly accounts: AccountService,
    private readonly clock: Clock,
  ) {}

  /** Recomputes every hash, every amount, and what the accounts of a vessel should hold by her posted logs. */
  async ofVessel(em: EntityManager, vesselId: string): Promise<LedgerCheckDto> {
    const vessel = await em.findOneOrFail(Vessel, { id: vesselId });
    const parts = await em.find(FittedPart, { vessel: vessel.id }, { orderBy: { id: 'asc' } });
    const check: LedgerCheckDto = {
      vesselId: vessel.id,
      vesselName: vessel.name,
      checkedAt: this.clock.now().toISOString(),
      parts: parts.length,
      chains: 0,
      entries: 0,
      recomputed: 0,
      reversals: 0,
      differences: [],
      notRecomputed: [],
    };
    for (const part of parts) await this.checkPart(em, await underCheck(em, part), check);
    return check;
  }

  private async checkPart(em: EntityManager, one: PartUnderCheck, check: LedgerCheckDto): Promise<void> {
    const entries = await em.find(
      LedgerEntry,
      { fittedPart: one.part.id },
      { orderBy: { partDetail: 'asc', sequence: 'asc' } },
    );
    const chains = new Map<string, LedgerEntry[]>();
    for (const entry of entries) {
      chains.set(entry.partDetail, [...(chains.get(entry.partDetail) ?? []), entry]);
    }
    check.entries += entries.length;
    check.chains += chains.size;
    for (const chain of chains.values()) {
      check.differences.push(...chainDifferences(one, chain));
      for (const entry of chain) {
        if (entry.kind === 'reversal') {
          check.reversals += 1;
          check.differences.push(...reversalDifferences(one, entry, chain));
        } else {
          await checkAmount(em, one, entry, check);
        }
      }
    }
    check.differences.push(...(await this.accountDifferences(em, one)));
  }

  /** What posting would mend: an entry that no longer belongs, or one that is not there. */
  private async accountDifferences(em: EntityManager, one: PartUnderCheck): Promise<LedgerDifferenceDto[]> {
    try {
      const differences = await this.accounts.differences(em, one.part);
      return differences.flatMap(({ detail, outdated, missing }) => [
        ...outdated.map((entry) =>
          difference(one, entry, 'It still counts, and the posted logs and the detail no longer support it.'),
        ),
        ...missing.map(({ kind }) => ({
          ...difference(one, null, 'An entry the posted logs call for is not in the account.'),
          detailName: detail.name,
          kind,
        })),
      ]);
    } catch (error) {
      return [difference(one, null, messageOf(error))];
    }
  }
}

async function underCheck(em: EntityManager, part: FittedPart): Promise<PartUnderCheck> {
  const position = await em.findOneOrFail(Position, { id: part.position });
  const details = await em.find(PartDetail, { fittedPart: part.id });
  const spectra = await em.execute<StoredBytes[]>(
    `select s.data, s.sha256 from load_spectrum s join log_channel c on c.id = s.log_channel_id
      where c.position_id = ?`,
    [part.position],
  );
  const logs = await em.find(LoadLog, { vessel: part.vessel });
  return {
    part,
    label: position.label,
    details: new Map(details.map((detail) => [detail.id, detail])),
    spectra: new Map(spectra.map((row) => [row.sha256, row])),
    logHashes: new Map(logs.map(({ id, sha256 }) => [id, sha256])),
  };
}

function difference(
  { part, label, details }: PartUnderCheck,
  entry: LedgerEntry | null,
  what: string,
  amounts: { written: number; recomputed: number } | null = null,
): LedgerDifferenceDto {
  return {
    partId: part.id,
    positionLabel: label,
    detailName: entry === null ? null : (details.get(entry.partDetail)?.name ?? null),
    entryId: entry?.id ?? null,
    sequence: entry?.sequence ?? null,
    kind: entry?.kind ?? null,
    what,
    written: amounts?.written ?? null,
    recomputed: amounts?.recomputed ?? null,
  };
}

/** Every entry that does not carry the hash of its content and of its predecessor, and every gap in the numbering. */
function chainDifferences(one: PartUnderCheck, chain: readonly LedgerEntry[]): LedgerDifferenceDto[] {
  const found: LedgerDifferenceDto[] = [];
  let previousHash = FIRST_HASH;
  let sequence = 0;
  for (const entry of chain) {
    if (entry.sequence !== sequence + 1) {
      const gap = entry.sequence - sequence - 1;
      found.push(difference(one, entry, `${gap} ${gap === 1 ? 'entry is' : 'entries are'} gone before it.`));
    } else if (entry.previousHash !== previousHash) {
      found.push(difference(one, entry, 'It was not written after the entry that now stands before it.'));
    }
    if (entry.hash !== entryHash(contentOf(entry), entry.previousHash)) {
      found.push(
        difference(one, entry, 'It does not say what it said when it was posted: its hash differs.'),
      );
    }
    previousHash = entry.hash;
    sequence = entry.sequence;
  }
  return found;
}

function reversalDifferences(
  one: PartUnderCheck,
  entry: LedgerEntry,
  chain: readonly LedgerEntry[],
): LedgerDifferenceDto[] {
  const reversed = chain.find(({ id }) => id === entry.reverses);
  if (!reversed || reversed.sequence >= entry.sequence || reversed.kind === 'reversal') {
    return [difference(one, entry, 'It takes back no earlier entry of its detail.')];
  }
  if (entry.damage === 0 - reversed.damage) return [];
  return [
    difference(one, entry, 'It does not take back exactly what it reverses.', {
      written: entry.damage,
      recomputed: 0 - reversed.damage,
    }),
  ];
}

async function checkAmount(
  em: EntityManager,
  one: PartUnderCheck,
  entry: LedgerEntry,
  check: LedgerCheckDto,
): Promise<void> {
  try {
    const damage = await amountOf(em, one, entry);
    check.recomputed += 1;
    if (Math.abs(damage - entry.damage) <= AMOUNT_TOLERANCE * Math.abs(damage)) return;
    const engines =
      entry.engineVersion === ENGINE_VERSION
        ? ''
        : ` It was posted by engine ${entry.engineVersion} and recomputed by ${ENGINE_VERSION}.`;
    check.differences.push(
      difference(one, entry, `The stored spectrum gives another amount.${engines}`, {
        written: entry.damage,
        recomputed: damage,
      }),
    );
  } catch (error) {
    const into = error instanceof NotRecomputable ? check.notRecomputed : check.differences;
    into.push(difference(one, entry, messageOf(error)));
  }
}

/** The damage of an entry, worked out from nothing but what the entry names. */
async function amountOf(em: EntityManager, one: PartUnderCheck, entry: LedgerEntry): Promise<number> {
  const basis = entry.basis as Basis;
  const model = await modelOf(em, one, entry, basis);
  if (entry.kind === 'recorded') {
    const named = basis.logSha256 ?? null;
    if (named !== null && entry.loadLog !== null && one.logHashes.get(entry.loadLog) !== named) {
      throw new Differs('The load log is not the file it was posted from: its hash differs.');
    }
    return recordedDamage(logOf(one, basis.spectrumSha256, 0), model).damage;
  }
  if (entry.kind === 'between-logs') {
    const residues = Array.isArray(basis.residuesOf) ? (basis.residuesOf as CanonicalValue[]) : [];
    if (residues.length === 0) throw new Differs('It does not say between which logs.');
    return betweenLogsDamage(
      residues.map((sha256, i) => logOf(one, sha256, i)),
      model,
    ).damage;
  }
  throw new NotRecomputable(`Amounts of the kind "${entry.kind}" stand on no stored spectrum.`);
}

/** A stored spectrum as a log; the entry lists them in time order, so the place in the list stands for the time. */
function logOf({ spectra }: PartUnderCheck, sha256: CanonicalValue | undefined, at: number): LogOfAccount {
  const stored = typeof sha256 === 'string' ? spectra.get(sha256) : undefined;
  if (!stored) throw new Differs('A load spectrum it was computed from is not stored any more.');
  if (createHash('sha256').update(stored.data).digest('hex') !== stored.sha256) {
    throw new Differs('A load spectrum it was computed from was altered: its hash differs.');
  }
  return { loadLogId: `${at}`, fromMs: at, spectrum: decodeSpectrum(stored.data) };
}

async function modelOf(
  em: EntityManager,
  { details }: PartUnderCheck,
  entry: LedgerEntry,
  basis: Basis,
): Promise<DetailModel> {
  const detail = details.get(entry.partDetail);
  if (!detail) throw new Differs('Its detail is not on record.');
  // Entries of early versions name the model by its hash alone: it is then that of the detail, or not known any more.
  const inputs = basis.inputs ?? asStored(detail.model.inputs);
  if (modelSha256Of(entry.curve, inputs) !== basis.modelSha256) {
    if (basis.inputs !== undefined) throw new Differs('Curve and inputs do not fit the hash it names.');
    throw new NotRecomputable('The detail was described otherwise then, and the entry does not repeat how.');
  }
  const [id, version] = entry.curve;
  const { data } = await em.findOneOrFail(Curve, { id, version });
  const model = detailModelOf(
    {
      curveId: id,
      curveVersion: version,
      // The hash above vouches that these are the inputs the entry was computed with.
      inputs: inputs as unknown as DetailInputs | null,
      name: detail.name,
    },
    data as ReferenceCurve,
  );
  if (model === null) throw new Differs('It names a detail without inputs.');
  return model;
}

function messageOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}

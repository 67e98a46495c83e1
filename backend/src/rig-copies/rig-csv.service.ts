import { EntityManager } from '@mikro-orm/postgresql';
import { HttpException, Injectable } from '@nestjs/common';
import { fitPartSchema } from '@stayledger/shared/contracts/parts';
import type { ImportedRigDto, ImportRigInput, RigCsvDto } from '@stayledger/shared/contracts/rig';
import { createPositionSchema } from '@stayledger/shared/contracts/rig';
import { CsvError } from '@stayledger/shared/rig/csv/csv-text';
import { readRigCsv, writeRigCsv, type RigCsvPart, type RigCsvRow } from '@stayledger/shared/rig/csv/rig-csv';
import type { Principal } from '../auth/principal.js';
import { AppError, InvalidRequestError } from '../common/errors/app-error.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { PartsService } from '../parts/parts.service.js';
import { Position } from '../rig/position.entity.js';
import { RigService } from '../rig/rig.service.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';

type Outcome = ImportedRigDto['lines'][number];

/** A rig as a file, and a file as a rig. */
@Injectable()
export class RigCsvService {
  constructor(
    private readonly em: EntityManager,
    private readonly reach: VesselReach,
    private readonly rigs: RigService,
    private readonly parts: PartsService,
  ) {}

  async write(me: Principal, vesselId: string): Promise<RigCsvDto> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'vessels:read');
    const positions = await this.em.find(
      Position,
      { vessel: vessel.id, archivedAt: null },
      { orderBy: { sortOrder: 'asc', label: 'asc', id: 'asc' } },
    );
    const fitted = await this.em.find(FittedPart, { vessel: vessel.id, removedOn: null });
    const partIn = new Map(fitted.map((part) => [part.position, part]));
    return {
      fileName: `rig of ${vessel.name}.csv`,
      csv: writeRigCsv(
        positions.map(({ id, kind, side, mast, label }) => {
          const part = partIn.get(id);
          return { kind, side, mast, label, part: part ? toCsvPart(part) : null };
        }),
      ),
    };
  }

  /**
   * Adds the places and parts of a file. Everything is carried out behind a savepoint: with a fault in any line, or
   * when only asked what would happen, all of it is taken back. What is on the rig already is left alone.
   */
  async read(me: Principal, vesselId: string, { csv, apply }: ImportRigInput): Promise<ImportedRigDto> {
    const vessel = await this.reach.findOrFail(me, vesselId, 'rig:update');
    const rows = rowsOf(csv);
    await this.em.execute('select 1 from vessel where id = ? for update', [vessel.id]);
    await this.em.execute('savepoint before_import');
    const lines: Outcome[] = [];
    for (const row of rows) lines.push(await this.readRow(me, vessel.id, row));
    const applied = apply && lines.every(({ errors }) => errors.length === 0);
    if (applied) {
      await this.em.execute('release savepoint before_import');
    } else {
      await this.em.execute('rollback to savepoint before_import');
      this.em.clear();
    }
    return { applied, lines };
  }

  private async readRow(me: Principal, vesselId: string, row: RigCsvRow): Promise<Outcome> {
    const said = { line: row.line, label: row.label || [row.kind, row.side, row.mast].join(' ') };
    if (row.errors.length > 0) return { ...said, outcome: 'wrong', errors: row.errors };
    await this.em.execute('savepoint before_line');
    try {
      const outcome = await this.carryOut(me, vesselId, row);
      await this.em.execute('release savepoint before_line');
      return { ...said, outcome, errors: [] };
    } catch (error) {
      const errors = faultsOf(error);
      await this.em.execute('rollback to savepoint before_line');
      this.em.clear();
      return { ...said, outcome: 'wrong', errors };
    }
  }

  private async carryOut(me: Principal, vesselId: string, row: RigCsvRow): Promise<Outcome['outcome']> {
    const known = await this.positionOf(vesselId, row);
    const partThere = known && (await this.em.findOne(FittedPart, { position: known.id, removedOn: null }));
    if (known && (row.part === null || partThere)) return 'left-alone';
    const { kind, side, mast, label } = row;
    const positionId =
      known?.id ??
      (
        await this.rigs.addPosition(
          me,
          vesselId,
          createPositionSchema.parse({ kind, side, mast, ...(label === '' ? {} : { label }) }),
        )
      ).id;
    if (row.part === null) return 'adds-position';
    await this.parts.fit(me, positionId, fitPartSchema.parse(toFitInput(row.part)));
    return known ? 'fits-part' : 'adds-position-and-part';
  }

  /** By its label where the file gives one, else the only one of its kind, side and mast. */
  private async positionOf(
    vesselId: string,
    { kind, side, mast, label }: RigCsvRow,
  ): Promise<Position | null> {
    const place = label === '' ? { kind, side, mast } : { label };
    const found = await this.em.find(Position, { vessel: vesselId, archivedAt: null, ...place });
    if (found.length > 1) {
      throw new InvalidRequestError({ label: ['Several such places are on the rig: name the one meant.'] });
    }
    return found[0] ?? null;
  }
}

function rowsOf(csv: string): RigCsvRow[] {
  try {
    return readRigCsv(csv);
  } catch (error) {
    if (!(error instanceof CsvError)) throw error;
    throw new InvalidRequestError({ csv: [`Line ${error.line}: ${error.message}`] });
  }
}

/** What a person can mend, in words; anything else is a fault of ours and goes on. */
function faultsOf(error: unknown): string[] {
  if (error instanceof InvalidRequestError) return Object.values(error.fieldErrors ?? {}).flat();
  if (isZodError(error)) return error.issues.map(({ path, message }) => `${path.join('.')}: ${message}`);
  if (error instanceof AppError || error instanceof HttpException) return [error.message];
  throw error;
}

function isZodError(
  error: unknown,
): error is Error & { issues: { path: (string | number)[]; message: string }[] } {
  return error instanceof Error && error.name === 'ZodError' && 'issues' in error;
}

function toFitInput({ certifiedBreakingLoadKn, ...part }: RigCsvPart) {
  return {
    ...part,
    breakingLoadKn: certifiedBreakingLoadKn,
    breakingLoadFromCertificate: certifiedBreakingLoadKn !== null,
  };
}

function toCsvPart(part: FittedPart): RigCsvPart {
  return {
    constructionId: part.construction[0],
    diameterMm: part.diameterMm,
    certifiedBreakingLoadKn: part.breakingLoadSource === 'certificate' ? part.breakingLoadKn : null,
    certificate: part.certificate,
    lengthM: part.lengthM,
    upperTerminal: part.upperTerminal,
    lowerTerminal: part.lowerTerminal,
    threadSize: part.threadSize,
    pinDiameterMm: part.pinDiameterMm,
    batch: part.batch,
    fittedOn: part.fittedOn,
    notes: part.notes,
  };
}

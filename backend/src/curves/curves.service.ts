import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type {
  addCurveSchema,
  CurveDto,
  CurveListDto,
  ListedCurveDto,
  reviseCurveSchema,
} from '@stayledger/shared/contracts/curves';
import { curveProblems } from '@stayledger/shared/fatigue/curves/curve-problems';
import type { z } from 'zod';
import type { Principal } from '../auth/principal.js';
import { InvalidRequestError, NotFoundError } from '../common/errors/app-error.js';
import { OwnReferenceService } from '../own-reference/own-reference.service.js';

type AddInput = z.output<typeof addCurveSchema>;
type ReviseInput = z.output<typeof reviseCurveSchema>;

interface Row {
  data: CurveDto;
  firm_id: string | null;
  firm_name: string | null;
}

/** Curves of the product and of the person's own firms. */
@Injectable()
export class CurvesService {
  constructor(
    private readonly em: EntityManager,
    private readonly own: OwnReferenceService,
  ) {}

  /** The newest version of each curve, by name. */
  async list(me: Principal): Promise<CurveListDto> {
    const rows: Row[] = await this.em.execute(
      `select newest.data, newest.firm_id, f.name as firm_name from (
         select distinct on (id) name, data, firm_id from curve
          where firm_id is null or firm_id = any (array[?]::uuid[]) order by id, version desc) newest
         left join firm f on f.id = newest.firm_id
        order by newest.name`,
      [firmsOf(me)],
    );
    return { items: rows.map(toListed) };
  }

  /** One curve, in the newest version in reach or the one an account was computed with. */
  async get(id: string, version?: number): Promise<ListedCurveDto> {
    const [row]: Row[] = await this.em.execute(
      `select c.data, c.firm_id, f.name as firm_name from curve c left join firm f on f.id = c.firm_id
        where c.id = ? and (?::int is null or c.version = ?::int)
        order by c.version desc limit 1`,
      [id, version ?? null, version ?? null],
    );
    if (!row) throw new NotFoundError();
    return toListed(row);
  }

  async add(me: Principal, { firmId, ...input }: AddInput): Promise<ListedCurveDto> {
    const firm = this.own.firmOf(me, firmId);
    const curve = toCurve(this.own.newReferenceId(), 1, input);
    await this.own.add(me, 'curve', firm, curve);
    return { ...curve, firm };
  }

  async revise(me: Principal, id: string, { version, ...input }: ReviseInput): Promise<ListedCurveDto> {
    const { row, firm } = await this.own.revise(me, 'curve', id, version, (next) => toCurve(id, next, input));
    return { ...row, firm };
  }
}

/** The stored curve. What a firm writes holds the mean load of its own tests: no further mean rule may be put on it. */
function toCurve(id: string, version: number, input: Omit<AddInput, 'firmId'>): CurveDto {
  const problems = curveProblems(input);
  const { minRange, maxRange } = input.validity;
  if (problems.length > 0) throw new InvalidRequestError({ segments: problems });
  if (minRange !== null && maxRange !== null && minRange >= maxRange) {
    throw new InvalidRequestError({
      'validity.maxRange': ['The largest range tested must be above the smallest.'],
    });
  }
  if (input.level === 'mean-minus-k-sd' && input.k === 0) {
    throw new InvalidRequestError({ k: ['Say how many standard deviations below the mean the curve lies.'] });
  }
  return {
    id,
    version,
    name: input.name,
    appliesTo: input.appliesTo,
    measure: input.measure,
    level: input.level,
    k: input.level === 'mean-minus-k-sd' ? input.k : 0,
    sdLog10N: input.sdLog10N,
    environment: input.environment,
    segments: input.segments,
    meanLoad: { kind: 'none', reason: 'taken as tested: the mean load of the tests is in the curve.' },
    thickness: null,
    threadSize: null,
    cutOffRange: null,
    validity: {
      ...input.validity,
      note:
        minRange === null && maxRange === null
          ? 'The range of the tests is not stated.'
          : 'Within the ranges tested; beyond them the line is carried on.',
    },
    source: input.source,
    provenance: input.provenance,
    provenanceNote: input.provenanceNote,
    analogyNote: input.analogyNote,
    selectable: true,
  };
}

function toListed({ data, firm_id, firm_name }: Row): ListedCurveDto {
  return { ...data, firm: firm_id === null ? null : { id: firm_id, name: firm_name ?? '' } };
}

function firmsOf(me: Principal): string[] {
  return me.capacities.flatMap(({ firmId }) => (firmId ? [firmId] : []));
}

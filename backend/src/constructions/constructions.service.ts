import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type {
  addConstructionSchema,
  ConstructionDto,
  ConstructionListDto,
  ListedConstructionDto,
  reviseConstructionSchema,
} from '@stayledger/shared/contracts/constructions';
import type { z } from 'zod';
import type { Principal } from '../auth/principal.js';
import { InvalidRequestError } from '../common/errors/app-error.js';
import { isMaterial, replacementRule } from '../life/reference-rules.js';
import { OwnReferenceService } from '../own-reference/own-reference.service.js';

type AddInput = z.output<typeof addConstructionSchema>;
type ReviseInput = z.output<typeof reviseConstructionSchema>;

/** Wires, rods and ropes of the product and of the person's own firms. */
@Injectable()
export class ConstructionsService {
  constructor(
    private readonly em: EntityManager,
    private readonly own: OwnReferenceService,
  ) {}

  /** The newest version of each, by name. */
  async list(me: Principal): Promise<ConstructionListDto> {
    const rows: { data: ConstructionDto; firm_id: string | null; firm_name: string | null }[] =
      await this.em.execute(
        `select newest.data, newest.firm_id, f.name as firm_name from (
           select distinct on (id) name, data, firm_id from construction
            where firm_id is null or firm_id = any (array[?]::uuid[]) order by id, version desc) newest
           left join firm f on f.id = newest.firm_id
          order by newest.name`,
        [firmsOf(me)],
      );
    return {
      items: rows.map(({ data, firm_id, firm_name }) => ({
        ...data,
        firm: firm_id === null ? null : { id: firm_id, name: firm_name ?? '' },
      })),
    };
  }

  async add(me: Principal, { firmId, ...input }: AddInput): Promise<ListedConstructionDto> {
    const firm = this.own.firmOf(me, firmId);
    const construction = toConstruction(this.own.newReferenceId(), 1, input);
    await this.own.add(me, 'construction', firm, construction);
    return { ...construction, firm };
  }

  async revise(
    me: Principal,
    id: string,
    { version, ...input }: ReviseInput,
  ): Promise<ListedConstructionDto> {
    const { row, firm } = await this.own.revise(me, 'construction', id, version, (next) =>
      toConstruction(id, next, input),
    );
    return { ...row, firm };
  }

  /** The newest version to fit a part with; null when there is none the person may use. */
  async newest(me: Principal, id: string): Promise<ConstructionDto | null> {
    const [row]: { data: ConstructionDto }[] = await this.em.execute(
      `select data from construction where id = ? and (firm_id is null or firm_id = any (array[?]::uuid[]))
        order by version desc limit 1`,
      [id, firmsOf(me)],
    );
    return row?.data ?? null;
  }

  /** The version a part was fitted with. */
  async version([id, version]: [string, number]): Promise<ConstructionDto> {
    const [row]: { data: ConstructionDto }[] = await this.em.execute(
      'select data from construction where id = ? and version = ?',
      [id, version],
    );
    return row.data;
  }

  /** Name and kind of wire of several at once, by `id@version`. */
  async namesOf(
    versions: readonly [string, number][],
  ): Promise<Map<string, Pick<ConstructionDto, 'name' | 'kindOfWire'>>> {
    if (versions.length === 0) return new Map();
    const rows: { key: string; name: string; kind_of_wire: ConstructionDto['kindOfWire'] }[] =
      await this.em.execute(
        `select id || '@' || version as key, name, data ->> 'kindOfWire' as kind_of_wire
           from construction where id || '@' || version = any (array[?]::text[])`,
        [[...new Set(versions.map((version) => version.join('@')))]],
      );
    return new Map(rows.map((row) => [row.key, { name: row.name, kindOfWire: row.kind_of_wire }]));
  }
}

/** The stored construction. What follows from the figures given is worked out here and never asked for. */
function toConstruction(id: string, version: number, input: Omit<AddInput, 'firmId'>): ConstructionDto {
  if (!isMaterial(input.materialId)) {
    throw new InvalidRequestError({ materialId: ['Choose a material from the list.'] });
  }
  if (input.replacementRuleId !== null && !replacementRule(input.replacementRuleId)) {
    throw new InvalidRequestError({ replacementRuleId: ['Choose a calendar rule from the list.'] });
  }
  const sizes = [...input.sizes].sort((a, b) => a.diameterMm - b.diameterMm);
  const fills = sizes.map((size) => size.metallicAreaMm2 / circleMm2(size.diameterMm));
  input.sizes.forEach((size, index) => {
    if (size.metallicAreaMm2 > circleMm2(size.diameterMm) * (1 + AREA_ROUNDING)) {
      throw new InvalidRequestError({
        [`sizes.${index}.metallicAreaMm2`]: ['The area is larger than the circle of this diameter.'],
      });
    }
  });
  if (new Set(sizes.map(({ diameterMm }) => diameterMm)).size < sizes.length) {
    throw new InvalidRequestError({ sizes: ['Each diameter may stand once.'] });
  }
  return {
    id,
    version,
    name: input.name,
    kind: input.kind,
    kindOfWire: input.kind === 'rod' || input.kind === 'fibre' ? input.kind : 'strand',
    materialId: input.materialId,
    fillFactor: Math.min(1, fills.reduce((sum, fill) => sum + fill, 0) / fills.length),
    youngGpa: input.youngGpa,
    replacementRuleId: input.replacementRuleId,
    sizes: sizes.map(({ breakingLoadKn, ...size }) => ({
      designation: `${size.diameterMm} mm`,
      ...size,
      breakingLoads: [{ gradeMpa: null, breakingLoadKn }],
      // GPa times mm2 is kN.
      axialStiffnessKn: input.youngGpa * size.metallicAreaMm2,
    })),
    source: input.source,
    provenance: input.provenance,
    provenanceNote: input.provenanceNote,
  };
}

/** Areas in tables are rounded; a solid rod may come out a little above its circle. */
const AREA_ROUNDING = 0.01;

function circleMm2(diameterMm: number): number {
  return (Math.PI / 4) * diameterMm ** 2;
}

function firmsOf(me: Principal): string[] {
  return me.capacities.flatMap(({ firmId }) => (firmId ? [firmId] : []));
}

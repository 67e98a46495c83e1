import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { ConstructionDto, ConstructionListDto } from '@stayledger/shared/contracts/constructions';
import type { Principal } from '../auth/principal.js';

/** Wires, rods and ropes of the product and of the person's own firms. */
@Injectable()
export class ConstructionsService {
  constructor(private readonly em: EntityManager) {}

  /** The newest version of each, by name. */
  async list(me: Principal): Promise<ConstructionListDto> {
    const rows: { data: ConstructionDto }[] = await this.em.execute(
      `select data from (
         select distinct on (id) name, data from construction
          where firm_id is null or firm_id = any (array[?]::uuid[]) order by id, version desc) newest
        order by name`,
      [firmsOf(me)],
    );
    return { items: rows.map(({ data }) => data) };
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

function firmsOf(me: Principal): string[] {
  return me.capacities.flatMap(({ firmId }) => (firmId ? [firmId] : []));
}

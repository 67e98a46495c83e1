import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { CurveDto, CurveListDto } from '@stayledger/shared/contracts/curves';
import type { Principal } from '../auth/principal.js';
import { NotFoundError } from '../common/errors/app-error.js';

/** Curves of the product and of the person's own firms. */
@Injectable()
export class CurvesService {
  constructor(private readonly em: EntityManager) {}

  /** The newest version of each curve, by name. */
  async list(me: Principal): Promise<CurveListDto> {
    const rows: { data: CurveDto }[] = await this.em.execute(
      `select data from (
         select distinct on (id) name, data from curve
          where firm_id is null or firm_id = any (array[?]::uuid[]) order by id, version desc) newest
        order by name`,
      [firmsOf(me)],
    );
    return { items: rows.map(({ data }) => data) };
  }

  /** One curve, in the newest version or the one an account was computed with. */
  async get(me: Principal, id: string, version?: number): Promise<CurveDto> {
    const [row]: { data: CurveDto }[] = await this.em.execute(
      `select data from curve
        where id = ? and (firm_id is null or firm_id = any (array[?]::uuid[])) and (?::int is null or version = ?::int)
        order by version desc limit 1`,
      [id, firmsOf(me), version ?? null, version ?? null],
    );
    if (!row) throw new NotFoundError();
    return row.data;
  }
}

function firmsOf(me: Principal): string[] {
  return me.capacities.flatMap(({ firmId }) => (firmId ? [firmId] : []));
}

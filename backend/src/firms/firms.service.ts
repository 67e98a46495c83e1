import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { FirmDto } from '@stayledger/shared/contracts/firms';
import { z } from 'zod';
import { decodeCursor, toPage, type Page } from '../common/pagination/cursor.js';

type Row = Omit<FirmDto, 'createdAt'> & { created_at: string };
const cursorSchema = z.tuple([z.string(), z.uuid()]);

@Injectable()
export class FirmsService {
  constructor(private readonly em: EntityManager) {}

  /** By name; for administrators. */
  async list(query: { cursor?: string; limit: number }): Promise<Page<FirmDto>> {
    const after = decodeCursor(query.cursor, cursorSchema);
    const rows: Row[] = await this.em.execute(
      `select f.id, f.name, f.kind, f.created_at,
              count(distinct m.user_id) filter (where m.ended_at is null)::int as members
         from firm f left join membership m on m.firm_id = f.id
        where ?::text is null or (f.name, f.id) > (?::text, ?::uuid)
        group by f.id order by f.name, f.id limit ?`,
      [after?.[0] ?? null, after?.[0] ?? null, after?.[1] ?? null, query.limit + 1],
    );
    const page = toPage(rows, query.limit, ({ name, id }) => [name, id]);
    return {
      items: page.rows.map(({ created_at, ...firm }) => ({
        ...firm,
        createdAt: new Date(created_at).toISOString(),
      })),
      nextCursor: page.nextCursor,
    };
  }
}

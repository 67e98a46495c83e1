import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { FleetRowDto, vesselListQuerySchema } from '@stayledger/shared/contracts/vessels';
import { z } from 'zod';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import { decodeCursor, toPage, type Page } from '../common/pagination/cursor.js';
import { permittedVessels } from './vessel-reach.service.js';

type Query = z.output<typeof vesselListQuerySchema>;

/** Sort key, name in lower case, id: together unique, so no row is shown twice or left out between pages. */
const cursorSchema = z.tuple([z.string().max(100), z.string().max(200), z.uuid()]);

interface Row {
  id: string;
  name: string;
  rig_type: FleetRowDto['rigType'];
  home_port: string | null;
  use_kind: FleetRowDto['useKind'];
  zone: string;
  parts: number;
  overdue: number;
  due: number;
  assessed: number;
  not_assessed: number;
  calendar_only: number;
  logs_waiting: number;
  logged_hours: number;
  last_log_at: string | null;
  sort_key: string;
  lower_name: string;
}

interface GoverningRow {
  vessel_id: string;
  part_id: string;
  label: string;
  kind_of_wire: 'strand' | 'rod' | 'fibre';
  assessment: 'assessed' | 'not-assessed' | 'calendar-only';
  replace_by_on: string;
  rule: 'fatigue' | 'calendar';
  allowance_used: number | null;
  due: 'in-date' | 'due' | 'overdue';
}

/** Each sort as SQL: the key, its type for the cursor, and whether the largest comes first. */
const SORTS: Record<Query['sort'], { key: string; type: string; descending: boolean }> = {
  due: { key: `coalesce(s.first_due_on, 'infinity'::date)`, type: 'date', descending: false },
  name: { key: 'lower(s.name)', type: 'text', descending: false },
  'last-log': {
    key: `coalesce(s.last_log_at, '-infinity'::timestamptz)`,
    type: 'timestamptz',
    descending: true,
  },
};

const FILTERS: Record<Query['filter'], string> = {
  all: 'true',
  overdue: 's.overdue > 0',
  due: 's.due > 0',
  waiting: 's.logs_waiting > 0',
  'not-assessed': 's.not_assessed > 0',
};

/** The same rule as `toPartStandingDto`, in SQL: an allowance used up is overdue whatever the date. */
const DUE_STATE = `case
    when s.replace_by_on < v.today_on or coalesce(s.allowance_used, 0) >= 1 then 'overdue'
    when s.replace_by_on <= (v.today_on + interval '12 months')::date then 'due'
    else 'in-date' end`;

/**
 * The fleet, one row per vessel, from the summary the database keeps of each: neither parts nor ledgers are added up
 * here. Dates in the summary are sorted, so `width_bucket` counts those up to a day.
 */
@Injectable()
export class FleetList {
  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
  ) {}

  async page(me: Principal, query: Query): Promise<Page<FleetRowDto>> {
    const after = decodeCursor(query.cursor, cursorSchema);
    const sort = SORTS[query.sort];
    const now = this.clock.now();
    const permitted = permittedVessels(me, 'vessels:read', now);
    const rows: Row[] = await this.em.execute(
      `with v as materialized (
         select v.id, v.name, v.rig_type, v.home_port, v.use_kind, v.zone, (?::timestamptz at time zone v.zone)::date as today_on
           from vessel v
          where v.archived_at is null and ${permitted.sql}
            and (?::text is null or v.name ilike ? or v.home_port ilike ?)),
       s as (
         select v.*, coalesce(s.parts, 0) as parts, coalesce(s.assessed, 0) as assessed,
                coalesce(s.not_assessed, 0) as not_assessed, coalesce(s.calendar_only, 0) as calendar_only,
                coalesce(s.used_up, 0) + coalesce(width_bucket(v.today_on - 1, s.replace_by_dates), 0) as overdue,
                coalesce(width_bucket((v.today_on + interval '12 months')::date, s.replace_by_dates)
                       - width_bucket(v.today_on - 1, s.replace_by_dates), 0) as due,
                s.first_due_on, coalesce(s.logs_waiting, 0) as logs_waiting,
                coalesce(s.logged_hours, 0) as logged_hours, s.last_log_at
           from v left join vessel_standing s on s.vessel_id = v.id)
       select s.*, (${sort.key})::text as sort_key, lower(s.name) as lower_name
         from s
        where ${FILTERS[query.filter]}
          and (?::text is null or ${sort.key} ${sort.descending ? '<' : '>'} ?::${sort.type}
            or (${sort.key} = ?::${sort.type} and (lower(s.name), s.id) > (?::text, ?::uuid)))
        order by ${sort.key} ${sort.descending ? 'desc' : 'asc'}, lower(s.name), s.id
        limit ?`,
      [
        now,
        ...permitted.values,
        ...searchValues(query.q),
        after?.[0] ?? null,
        after?.[0] ?? null,
        after?.[0] ?? null,
        after?.[1] ?? null,
        after?.[2] ?? null,
        query.limit + 1,
      ],
    );
    const page = toPage(rows, query.limit, (row) => [row.sort_key, row.lower_name, row.id]);
    const governing = await this.governingOf(page.rows.map(({ id }) => id));
    return {
      items: page.rows.map((row) => toFleetRow(row, governing.get(row.id) ?? null)),
      nextCursor: page.nextCursor,
    };
  }

  /** The part whose date comes first, for the vessels of one page. */
  private async governingOf(vesselIds: readonly string[]): Promise<Map<string, GoverningRow>> {
    if (vesselIds.length === 0) return new Map();
    const rows: GoverningRow[] = await this.em.execute(
      `select distinct on (s.vessel_id) s.vessel_id, p.id as part_id, q.label, c.data ->> 'kindOfWire' as kind_of_wire,
              s.assessment, s.replace_by_on::text as replace_by_on,
              s.governing_rule as rule, s.allowance_used, ${DUE_STATE} as due
         from (select id, (?::timestamptz at time zone zone)::date as today_on from vessel where id = any (array[?]::uuid[])) v
         join part_standing s on s.vessel_id = v.id
         join fitted_part p on p.id = s.fitted_part_id and p.removed_on is null
         join position q on q.id = p.position_id
         join construction c on c.id = p.construction_id and c.version = p.construction_version
        where s.replace_by_on is not null and s.governing_rule is not null
        order by s.vessel_id, s.replace_by_on, q.sort_order, q.label`,
      [this.clock.now(), vesselIds],
    );
    return new Map(rows.map((row) => [row.vessel_id, row]));
  }
}

function searchValues(q: string | undefined): [string | null, string, string] {
  if (q === undefined || q === '') return [null, '', ''];
  const pattern = `%${q.replace(/[\\%_]/g, '\\$&')}%`;
  return [pattern, pattern, pattern];
}

function toFleetRow(row: Row, governing: GoverningRow | null): FleetRowDto {
  return {
    id: row.id,
    name: row.name,
    rigType: row.rig_type,
    homePort: row.home_port,
    useKind: row.use_kind,
    zone: row.zone,
    governing: governing && {
      partId: governing.part_id,
      positionLabel: governing.label,
      kindOfWire: governing.kind_of_wire,
      assessment: governing.assessment,
      replaceByOn: governing.replace_by_on,
      rule: governing.rule,
      allowanceUsed: governing.allowance_used,
      due: governing.due,
    },
    counts: {
      parts: row.parts,
      overdue: row.overdue,
      due: row.due,
      assessed: row.assessed,
      notAssessed: row.not_assessed,
      calendarOnly: row.calendar_only,
      logsWaiting: row.logs_waiting,
    },
    loggedHours: row.logged_hours,
    lastLogAt: row.last_log_at === null ? null : new Date(row.last_log_at).toISOString(),
  };
}

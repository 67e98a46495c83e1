import type { Pool } from 'pg';

/** How many of everything; the names are numbers and mean nothing. */
export interface LargeFleet {
  /** Tells the ids of several fleets in one database apart. */
  series?: number;
  firmId: string;
  /** Whoever "uploaded" the logs. */
  userId: string;
  vessels: number;
  partsPerVessel: number;
  logsPerVessel: number;
  /** Day the dates are spread around, 'YYYY-MM-DD'. */
  todayOn: string;
}

/** Ids that sort in the order they were made, like the application's own. */
const idsOf =
  (series: number) =>
  (kind: number, number: string): string =>
    `('0190f1ee-${(series * 16 + kind).toString(16).padStart(4, '0')}-7000-8000-' || lpad(to_hex(${number}), 12, '0'))::uuid`;

/**
 * A fleet for measuring: vessels of one firm, each with parts in all states and some logs, written past row level
 * security in a few statements. Dates run from two years before to ten years after the given day; one part in eleven
 * was taken off.
 */
export async function seedLargeFleet(admin: Pool, fleet: LargeFleet): Promise<void> {
  const { firmId, userId, vessels, partsPerVessel, logsPerVessel, todayOn } = fleet;
  const id = idsOf(fleet.series ?? 0);
  const parts = vessels * partsPerVessel;
  const stamps = `$1::date, $1::date`;
  const run = (sql: string, values: unknown[] = []) => admin.query(sql, [todayOn, ...values]);
  await run(
    `insert into vessel (id, firm_id, name, rig_type, zone, home_port, created_at, updated_at)
     select ${id(1, 'n')}, $2::uuid, 'Vessel ' || lpad(((n * 7919) % $3)::text, 6, '0'),
            (array['masthead-sloop', 'cutter', 'ketch'])[1 + n % 3],
            (array['Europe/Oslo', 'America/Halifax', 'Pacific/Auckland'])[1 + n % 3], 'Port ' || n % 40, ${stamps}
       from generate_series(1, $3::int) n`,
    [firmId, vessels],
  );
  await run(
    `insert into vessel_access (id, vessel_id, party, role, created_at)
     select ${id(2, 'n')}, ${id(1, 'n')}, 'firm:' || $2::text, 'rigger', $1::date from generate_series(1, $3::int) n`,
    [firmId, vessels],
  );
  await run(
    `insert into position (id, vessel_id, kind, side, label, sort_order, created_at, updated_at)
     select ${id(3, 'n')}, ${id(1, '1 + n % $2')}, 'cap-shroud', 'port', 'Place ' || n / $2, n / $2, ${stamps}
       from generate_series(0, $3::int - 1) n`,
    [vessels, parts],
  );
  await run(
    `insert into fitted_part (id, vessel_id, position_id, construction_id, construction_version, diameter_mm,
        breaking_load_kn, breaking_load_source, metallic_area_mm2, upper_terminal, lower_terminal, removed_on,
        created_at, updated_at)
     select ${id(4, 'n')}, ${id(1, '1 + n % $2')}, ${id(3, 'n')}, 'strand-1x19-316', 1, 8, 50, 'table', 38, 'swaged', 'swaged',
            case when n % 11 = 0 then $1::date - 30 end, ${stamps}
       from generate_series(0, $3::int - 1) n`,
    [vessels, parts],
  );
  await run(
    `insert into part_standing (fitted_part_id, vessel_id, assessment, load_basis, allowance_used, replace_by_on,
        governing_rule, standing, computed_on, updated_at)
     select ${id(4, 'n')}, ${id(1, '1 + n % $2')},
            (array['assessed', 'not-assessed', 'calendar-only'])[1 + n % 3],
            case when n % 3 = 0 then 'measured' else 'none' end,
            case when n % 3 = 0 then ((n * 31) % 105) / 100.0 end,
            case when n % 7 > 0 then $1::date - 730 + (n * 7907) % 4380 end,
            case when n % 7 > 0 then 'calendar' end,
            jsonb_build_object('details', repeat('a stored result of the usual length ', 60)), $1::date, $1::date
       from generate_series(0, $3::int - 1) n`,
    [vessels, parts],
  );
  await run(
    `insert into load_log (id, vessel_id, state, file_name, size_bytes, mapping, to_at, logged_hours, uploaded_by,
        created_at, updated_at)
     select ${id(5, 'n')}, ${id(1, '1 + n % $3')}, (array['posted', 'counted', 'failed'])[1 + n % 3],
            'log ' || n || '.csv', 1000, '{}', $1::date - (n % 900), 20, $2::uuid, ${stamps}
       from generate_series(0, $3::int * $4::int - 1) n`,
    [userId, vessels, logsPerVessel],
  );
  await admin.query('analyze');
}

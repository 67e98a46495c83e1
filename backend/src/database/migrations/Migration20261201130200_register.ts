import { Migration } from '@mikro-orm/migrations';

const VESSEL_TABLES = ['rig_geometry', 'sensor', 'sensor_event', 'vessel_standing'] as const;

/**
 * The rig's geometry, the hardware of a part, sensors, and one summary row per vessel.
 *
 * The summary exists so that a list of thousands of vessels reads one narrow row each. Triggers keep it, because every
 * writer of standings, parts and logs would have to think of it otherwise. What is overdue or due depends on the day
 * it is looked at, so the row keeps the sorted dates and `width_bucket` counts them.
 */
export class Migration20261201130200_register extends Migration {
  override up(): void {
    this.addSql(`
      create table rig_geometry (
        vessel_id uuid primary key references vessel (id),
        data jsonb not null,
        created_at timestamptz not null,
        updated_at timestamptz not null,
        version int not null default 1
      );

      -- Turnbuckle, toggle, pin and chainplate of a part, and how its ends turn; null: nobody described them.
      alter table fitted_part add column hardware jsonb;

      create table sensor (
        id uuid primary key,
        vessel_id uuid not null references vessel (id),
        name text not null,
        kind text not null check (kind in ('pin', 'link', 'ram-pressure', 'strain', 'raw')),
        position_id uuid references position (id),
        full_scale_kn double precision,
        error_percent double precision,
        scale jsonb,
        in_line jsonb not null default '[]',
        placed_on date,
        removed_on date,
        notes text not null default '',
        created_at timestamptz not null,
        updated_at timestamptz not null,
        version int not null default 1
      );
      create index sensor_vessel on sensor (vessel_id);

      create table sensor_event (
        id uuid primary key,
        vessel_id uuid not null references vessel (id),
        sensor_id uuid not null references sensor (id),
        kind text not null check (kind in ('zero-check', 'calibration', 'battery')),
        done_on date not null,
        reading_kn double precision,
        rig_state text,
        stated_tension_kn double precision,
        battery_hours double precision,
        note text not null default '',
        recorded_by uuid not null references app_user (id),
        created_at timestamptz not null
      );
      create index sensor_event_sensor on sensor_event (sensor_id, done_on);
      create index sensor_event_vessel on sensor_event (vessel_id);

      create table vessel_standing (
        vessel_id uuid primary key references vessel (id),
        parts int not null default 0,
        assessed int not null default 0,
        not_assessed int not null default 0,
        calendar_only int not null default 0,
        used_up int not null default 0,
        first_due_on date,
        replace_by_dates date[] not null default '{}',
        logs_waiting int not null default 0,
        logged_hours double precision not null default 0,
        last_log_at timestamptz
      );
    `);

    this.addSql(`
      create function refresh_vessel_standing(vessels uuid[]) returns void
        language plpgsql volatile set search_path = public, pg_temp as $$
        begin
          insert into vessel_standing (vessel_id)
            select v from unnest(vessels) as v where v is not null order by v
            on conflict do nothing;
          -- Two people changing two parts of one vessel: the second waits here, then counts what the first wrote.
          perform 1 from vessel_standing where vessel_id = any (vessels) order by vessel_id for update;
          update vessel_standing t set
            parts = coalesce(s.parts, 0), assessed = coalesce(s.assessed, 0),
            not_assessed = coalesce(s.not_assessed, 0), calendar_only = coalesce(s.calendar_only, 0),
            used_up = coalesce(s.used_up, 0), first_due_on = s.first_due_on,
            replace_by_dates = coalesce(s.replace_by_dates, '{}')
          from unnest(vessels) as v
          left join lateral (
            select count(*)::int as parts,
                   count(*) filter (where s.assessment = 'assessed')::int as assessed,
                   count(*) filter (where s.assessment = 'not-assessed')::int as not_assessed,
                   count(*) filter (where s.assessment = 'calendar-only')::int as calendar_only,
                   count(*) filter (where s.replace_by_on is not null and s.allowance_used >= 1)::int as used_up,
                   min(s.replace_by_on) as first_due_on,
                   array_agg(s.replace_by_on order by s.replace_by_on)
                     filter (where s.replace_by_on is not null and coalesce(s.allowance_used, 0) < 1) as replace_by_dates
              from part_standing s
              join fitted_part p on p.id = s.fitted_part_id and p.removed_on is null
             where s.vessel_id = v
          ) s on true
          where t.vessel_id = v;
        end $$;

      create function refresh_vessel_logs(vessel uuid) returns void
        language plpgsql volatile set search_path = public, pg_temp as $$
        begin
          insert into vessel_standing (vessel_id) values (vessel) on conflict do nothing;
          perform 1 from vessel_standing where vessel_id = vessel for update;
          update vessel_standing t set logs_waiting = l.logs_waiting, logged_hours = l.logged_hours,
                                       last_log_at = l.last_log_at
          from (select count(*) filter (where g.state = 'counted')::int as logs_waiting,
                       coalesce(sum(g.logged_hours) filter (where g.state = 'posted'), 0) as logged_hours,
                       max(g.to_at) filter (where g.state in ('posted', 'counted')) as last_log_at
                  from load_log g where g.vessel_id = vessel) l
          where t.vessel_id = vessel;
        end $$;

      create function part_standing_changed() returns trigger
        language plpgsql set search_path = public, pg_temp as $$
        begin
          perform refresh_vessel_standing((select array_agg(distinct vessel_id) from changed));
          return null;
        end $$;
      create trigger part_standing_inserted after insert on part_standing
        referencing new table as changed for each statement execute function part_standing_changed();
      create trigger part_standing_updated after update on part_standing
        referencing new table as changed for each statement execute function part_standing_changed();
      create trigger part_standing_deleted after delete on part_standing
        referencing old table as changed for each statement execute function part_standing_changed();

      create function fitted_part_changed() returns trigger
        language plpgsql set search_path = public, pg_temp as $$
        begin
          perform refresh_vessel_standing(array[new.vessel_id]);
          return null;
        end $$;
      create trigger fitted_part_removed after update on fitted_part for each row
        when (old.removed_on is distinct from new.removed_on) execute function fitted_part_changed();

      create function load_log_changed() returns trigger
        language plpgsql set search_path = public, pg_temp as $$
        begin
          perform refresh_vessel_logs(new.vessel_id);
          return null;
        end $$;
      create trigger load_log_inserted after insert on load_log for each row execute function load_log_changed();
      create trigger load_log_updated after update on load_log for each row
        when ((old.state, old.logged_hours, old.to_at) is distinct from (new.state, new.logged_hours, new.to_at))
        execute function load_log_changed();
    `);

    this.addSql(`
      grant select, insert, update on rig_geometry, sensor, vessel_standing to stayledger_app;
      grant select, insert on sensor_event to stayledger_app;
    `);
    for (const table of VESSEL_TABLES) {
      this.addSql(`
        alter table ${table} enable row level security;
        alter table ${table} force row level security;
        create policy ${table}_reach on ${table}
          using (vessel_id in (select reachable_vessels()))
          with check (vessel_id in (select reachable_vessels()));
      `);
    }

    // Vessels that were there before: the owner is bound by the policies too, so each is brought into reach by name.
    this.addSql(`
      do $$
        declare party text;
        begin
          for party in select distinct a.party from vessel_access a loop
            perform set_config('app.parties', party, true);
            perform refresh_vessel_standing(array(select id from vessel));
            perform refresh_vessel_logs(id) from vessel;
          end loop;
          perform set_config('app.parties', '', true);
        end $$;
    `);
  }
}

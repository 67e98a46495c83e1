import { Migration } from '@mikro-orm/migrations';

/** Tables that hold vessel data: each carries `vessel_id` (the vessel itself: `id`) and gets the reach policy. */
const VESSEL_TABLES = [
  'position',
  'fitted_part',
  'part_detail',
  'part_standing',
  'usage_plan',
  'channel_mapping',
  'load_log',
  'log_channel',
  'load_spectrum',
  'ledger_entry',
] as const;

/**
 * The first schema. Two roles: the owner runs this, the application (`stayledger_app`) owns nothing. Both see vessel
 * data only through the policies at the end (row level security is forced, so the owner's seeds are bound as well).
 * Without the setting `app.parties` nobody sees a row.
 */
export class Migration20261201120000_first extends Migration {
  override up(): void {
    this.addSql(`
      create table app_user (
        id uuid primary key,
        email text not null,
        name text not null,
        password_hash text not null,
        preferences jsonb not null default '{}',
        active boolean not null default true,
        sessions_valid_from timestamptz not null,
        created_at timestamptz not null,
        updated_at timestamptz not null,
        version int not null default 1,
        constraint app_user_email_lower check (email = lower(email))
      );
      create unique index app_user_email_unique on app_user (email);

      create table firm (
        id uuid primary key,
        name text not null,
        kind text not null check (kind in ('rigging', 'survey', 'insurer', 'service')),
        currency text not null default 'EUR' check (currency ~ '^[A-Z]{3}$'),
        created_at timestamptz not null,
        updated_at timestamptz not null,
        version int not null default 1
      );

      create table membership (
        id uuid primary key,
        user_id uuid not null references app_user (id),
        firm_id uuid not null references firm (id),
        role text not null check (role in ('surveyor', 'rigger', 'insurer', 'administrator')),
        ended_at timestamptz,
        created_at timestamptz not null
      );
      create unique index membership_current_unique on membership (user_id, firm_id, role) where ended_at is null;

      create table session (
        sid varchar primary key,
        sess json not null,
        expire timestamp(6) not null
      );
      create index session_expire on session (expire);

      create table sign_in_attempt (
        id uuid primary key,
        account_key text not null,
        address text not null,
        succeeded boolean not null,
        attempted_at timestamptz not null
      );
      create index sign_in_attempt_account on sign_in_attempt (account_key, attempted_at);

      create table idempotency_key (
        user_id uuid not null references app_user (id),
        key text not null,
        route text not null,
        request_hash text not null,
        status int,
        reply jsonb,
        created_at timestamptz not null,
        primary key (user_id, key)
      );

      create table service_setting (
        key text primary key,
        value jsonb not null,
        updated_at timestamptz not null
      );

      create table curve (
        id text not null,
        version int not null,
        firm_id uuid references firm (id),
        name text not null,
        data jsonb not null,
        data_hash text not null,
        created_at timestamptz not null,
        primary key (id, version)
      );

      create table construction (
        id text not null,
        version int not null,
        firm_id uuid references firm (id),
        name text not null,
        data jsonb not null,
        data_hash text not null,
        created_at timestamptz not null,
        primary key (id, version)
      );

      create table vessel (
        id uuid primary key,
        firm_id uuid not null references firm (id),
        name text not null,
        rig_type text not null,
        zone text not null,
        build_year int,
        length_m double precision,
        home_port text,
        use_kind text not null default 'private',
        notes text not null default '',
        archived_at timestamptz,
        created_at timestamptz not null,
        updated_at timestamptz not null,
        version int not null default 1
      );

      create table vessel_access (
        id uuid primary key,
        vessel_id uuid not null references vessel (id),
        party text not null check (party ~ '^(firm|user):[0-9a-f-]{36}$'),
        role text not null check (role in ('surveyor', 'rigger', 'owner', 'insurer')),
        ends_at timestamptz,
        granted_by uuid references app_user (id),
        created_at timestamptz not null
      );
      create index vessel_access_party on vessel_access (party, vessel_id);
      create index vessel_access_vessel on vessel_access (vessel_id);

      create table position (
        id uuid primary key,
        vessel_id uuid not null references vessel (id),
        kind text not null,
        side text not null check (side in ('port', 'starboard', 'centre')),
        label text not null,
        mast text not null default 'main',
        sort_order int not null default 0,
        geometry jsonb,
        archived_at timestamptz,
        created_at timestamptz not null,
        updated_at timestamptz not null,
        version int not null default 1
      );
      create index position_vessel on position (vessel_id);
      create unique index position_label_unique on position (vessel_id, label) where archived_at is null;

      create table fitted_part (
        id uuid primary key,
        vessel_id uuid not null references vessel (id),
        position_id uuid not null references position (id),
        construction_id text not null,
        construction_version int not null,
        diameter_mm double precision not null,
        breaking_load_kn double precision not null,
        breaking_load_source text not null check (breaking_load_source in ('certificate', 'table', 'table-lower-grade')),
        metallic_area_mm2 double precision not null,
        length_m double precision,
        upper_terminal text not null,
        lower_terminal text not null,
        thread_size text,
        pin_diameter_mm double precision,
        batch text not null default '',
        certificate text not null default '',
        fitted_on date,
        removed_on date,
        removed_reason text,
        notes text not null default '',
        created_at timestamptz not null,
        updated_at timestamptz not null,
        version int not null default 1,
        foreign key (construction_id, construction_version) references construction (id, version)
      );
      create index fitted_part_vessel on fitted_part (vessel_id);
      create unique index fitted_part_current on fitted_part (position_id) where removed_on is null;

      create table part_detail (
        id uuid primary key,
        vessel_id uuid not null references vessel (id),
        fitted_part_id uuid not null references fitted_part (id),
        key text not null,
        name text not null,
        kind text not null,
        curve_id text,
        curve_version int,
        model jsonb not null,
        design_fatigue_factor double precision not null,
        explanation text not null default '',
        estimates jsonb not null default '[]',
        created_at timestamptz not null,
        updated_at timestamptz not null,
        version int not null default 1,
        foreign key (curve_id, curve_version) references curve (id, version)
      );
      create unique index part_detail_key on part_detail (fitted_part_id, key);
      create index part_detail_vessel on part_detail (vessel_id);

      create table part_standing (
        fitted_part_id uuid primary key references fitted_part (id),
        vessel_id uuid not null references vessel (id),
        assessment text not null check (assessment in ('assessed', 'not-assessed', 'calendar-only')),
        not_assessed_reason text,
        load_basis text not null,
        damage double precision,
        design_fatigue_factor double precision,
        allowance_used double precision,
        governing_detail text,
        logged_hours double precision not null default 0,
        fatigue_replace_by_on date,
        calendar_replace_by_on date,
        replace_by_on date,
        governing_rule text,
        remaining_years double precision,
        standing jsonb not null,
        computed_on date not null,
        updated_at timestamptz not null
      );
      create index part_standing_vessel on part_standing (vessel_id);

      create table usage_plan (
        id uuid primary key,
        vessel_id uuid not null references vessel (id),
        sailing_hours_per_year double precision not null check (sailing_hours_per_year >= 0 and sailing_hours_per_year <= 8784),
        note text not null default '',
        stated_by uuid not null references app_user (id),
        created_at timestamptz not null,
        updated_at timestamptz not null,
        version int not null default 1
      );
      create unique index usage_plan_vessel on usage_plan (vessel_id);

      create table channel_mapping (
        id uuid primary key,
        vessel_id uuid not null references vessel (id),
        column_name text not null,
        unit text not null,
        position_id uuid not null references position (id),
        updated_at timestamptz not null
      );
      create unique index channel_mapping_column on channel_mapping (vessel_id, column_name);

      create table load_log (
        id uuid primary key,
        vessel_id uuid not null references vessel (id),
        state text not null check (state in ('receiving', 'received', 'counting', 'counted', 'posted', 'set-aside', 'failed')),
        file_name text not null,
        size_bytes bigint not null,
        received_bytes bigint not null default 0,
        sha256 text,
        storage_key text,
        mapping jsonb not null,
        mapping_version int not null default 1,
        rows bigint,
        from_at timestamptz,
        to_at timestamptz,
        logged_hours double precision,
        sample_rate_hz double precision,
        findings jsonb not null default '[]',
        engine_version text,
        failure jsonb,
        uploaded_by uuid not null references app_user (id),
        decided_by uuid references app_user (id),
        decided_at timestamptz,
        decision_reason text,
        created_at timestamptz not null,
        updated_at timestamptz not null,
        version int not null default 1
      );
      create index load_log_vessel on load_log (vessel_id, created_at);
      create index load_log_sha on load_log (vessel_id, sha256);
      create unique index load_log_posted_once on load_log (vessel_id, sha256) where state = 'posted';

      create table log_channel (
        id uuid primary key,
        vessel_id uuid not null references vessel (id),
        load_log_id uuid not null references load_log (id),
        mapping_version int not null,
        engine_version text not null,
        position_id uuid not null references position (id),
        column_name text not null,
        unit text not null,
        step_kn double precision not null,
        samples bigint not null,
        missing bigint not null,
        turning_points bigint not null,
        closed_cycles double precision not null,
        min_kn double precision,
        max_kn double precision,
        max_at timestamptz,
        envelope bytea,
        created_at timestamptz not null
      );
      create unique index log_channel_once on log_channel (load_log_id, mapping_version, engine_version, column_name);
      create index log_channel_vessel on log_channel (vessel_id);
      create index log_channel_position on log_channel (position_id);

      create table load_spectrum (
        log_channel_id uuid primary key references log_channel (id),
        vessel_id uuid not null references vessel (id),
        format int not null,
        data bytea not null,
        sha256 text not null
      );
      create index load_spectrum_vessel on load_spectrum (vessel_id);

      create table ledger_entry (
        id uuid primary key,
        vessel_id uuid not null references vessel (id),
        fitted_part_id uuid not null references fitted_part (id),
        part_detail_id uuid not null references part_detail (id),
        sequence bigint not null,
        kind text not null check (kind in ('carried-in', 'recorded', 'between-logs', 'unlogged', 'sampling-correction', 'reversal')),
        load_log_id uuid references load_log (id),
        reverses_id uuid references ledger_entry (id),
        damage double precision not null,
        curve_id text not null,
        curve_version int not null,
        engine_version text not null,
        basis jsonb not null,
        posted_by uuid references app_user (id),
        posted_at timestamptz not null,
        previous_hash text not null,
        hash text not null,
        foreign key (curve_id, curve_version) references curve (id, version)
      );
      create unique index ledger_entry_sequence on ledger_entry (part_detail_id, sequence);
      create unique index ledger_entry_recorded_once on ledger_entry (part_detail_id, load_log_id, (basis ->> 'edition'))
        where kind = 'recorded';
      create unique index ledger_entry_reversed_once on ledger_entry (reverses_id) where reverses_id is not null;
      create index ledger_entry_vessel on ledger_entry (vessel_id);

      create table job (
        id uuid primary key,
        kind text not null,
        subject_id uuid not null,
        vessel_id uuid,
        input_version int not null,
        state text not null check (state in ('queued', 'running', 'done', 'failed', 'cancelled')),
        attempts int not null default 0,
        lease_until timestamptz,
        lease_token uuid,
        progress double precision not null default 0,
        last_error jsonb,
        created_at timestamptz not null,
        started_at timestamptz,
        finished_at timestamptz
      );
      create unique index job_open_once on job (kind, subject_id, input_version) where state in ('queued', 'running');
      create index job_open on job (state, lease_until) where state in ('queued', 'running');
      create index job_subject on job (subject_id);

      create table audit_event (
        id uuid primary key,
        at timestamptz not null,
        user_id uuid references app_user (id),
        vessel_id uuid,
        action text not null,
        subject_kind text not null,
        subject_id text not null,
        data jsonb not null default '{}'
      );
      create index audit_event_vessel on audit_event (vessel_id, at);
      create index audit_event_at on audit_event (at);
    `);

    this.addSql(`
      create function reachable_vessels() returns setof uuid
        language sql stable security definer set search_path = public, pg_temp as $$
          select a.vessel_id from vessel_access a
            where a.party = any (string_to_array(coalesce(current_setting('app.parties', true), ''), ','))
              and (a.ends_at is null or a.ends_at > now())
          union
          select substr(party, 8)::uuid
            from unnest(string_to_array(coalesce(current_setting('app.parties', true), ''), ',')) as party
            where party ~ '^vessel:[0-9a-f-]{36}$'
        $$;
      revoke all on function reachable_vessels() from public;
      grant execute on function reachable_vessels() to stayledger_app;
      grant usage on schema public to stayledger_app;
    `);

    this.addSql(`
      grant select, insert, update on app_user, firm, membership, vessel, vessel_access, position, fitted_part,
        part_detail, usage_plan, load_log, service_setting to stayledger_app;
      grant select, insert, update, delete on session, sign_in_attempt, idempotency_key, channel_mapping,
        part_standing, job, log_channel, load_spectrum to stayledger_app;
      grant select on curve, construction to stayledger_app;
      grant select, insert on ledger_entry, audit_event to stayledger_app;
      grant select on schema_migration to stayledger_app;
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
    this.addSql(`
      alter table vessel enable row level security;
      alter table vessel force row level security;
      create policy vessel_reach on vessel
        using (id in (select reachable_vessels())) with check (id in (select reachable_vessels()));

      alter table vessel_access enable row level security;
      alter table vessel_access force row level security;
      create policy vessel_access_reach on vessel_access
        using (vessel_id in (select reachable_vessels())) with check (vessel_id in (select reachable_vessels()));
      -- reachable_vessels() runs as the owner and must read this table without asking itself.
      create policy vessel_access_owner on vessel_access to current_user using (true) with check (true);

      alter table audit_event enable row level security;
      alter table audit_event force row level security;
      create policy audit_event_reach on audit_event
        using (vessel_id is null or vessel_id in (select reachable_vessels()))
        with check (vessel_id is null or vessel_id in (select reachable_vessels()));

      alter table idempotency_key enable row level security;
      alter table idempotency_key force row level security;
      create policy idempotency_key_own on idempotency_key
        using (user_id::text = current_setting('app.user_id', true))
        with check (user_id::text = current_setting('app.user_id', true));
    `);
  }
}

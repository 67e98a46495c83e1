import { Migration } from '@mikro-orm/migrations';

/**
 * The re-rig schedule: what a firm asks and when its yard is open, one schedule per vessel, and its plans. Requests and
 * plans are written once and never changed; which of them stands is said by the schedule.
 */
export class Migration20261201130600_rerig_schedules extends Migration {
  override up(): void {
    this.addSql(`
      create table yard_terms (
        id uuid primary key,
        firm_id uuid not null references firm (id),
        terms jsonb not null,
        stated_by uuid not null references app_user (id),
        created_at timestamptz not null,
        updated_at timestamptz not null,
        version int not null default 1,
        constraint yard_terms_firm unique (firm_id)
      );

      create table rerig_request (
        id uuid primary key,
        vessel_id uuid not null references vessel (id),
        number int not null,
        base_plan_id uuid,
        change jsonb,
        full_season_ids jsonb not null,
        asked_by uuid not null references app_user (id),
        created_at timestamptz not null,
        constraint rerig_request_number unique (vessel_id, number)
      );

      create table rerig_plan (
        id uuid primary key references rerig_request (id),
        vessel_id uuid not null references vessel (id),
        input jsonb not null,
        plan jsonb not null,
        alternatives jsonb not null,
        explanations jsonb not null,
        diff jsonb,
        window_labels jsonb not null,
        notes jsonb not null,
        created_at timestamptz not null
      );
      create index rerig_plan_vessel on rerig_plan (vessel_id);

      create table rerig_schedule (
        id uuid primary key,
        vessel_id uuid not null references vessel (id),
        state text not null check (state in ('draft', 'proposed', 'accepted', 'booked', 'done')),
        horizon_years int not null default 12,
        absences jsonb not null,
        plan_id uuid references rerig_plan (id),
        request_id uuid references rerig_request (id),
        question text,
        created_at timestamptz not null,
        updated_at timestamptz not null,
        version int not null default 1,
        constraint rerig_schedule_vessel unique (vessel_id)
      );

      grant select, insert, update on yard_terms, rerig_schedule to stayledger_app;
      grant select, insert on rerig_request, rerig_plan to stayledger_app;
    `);
    for (const table of ['rerig_request', 'rerig_plan', 'rerig_schedule']) {
      this.addSql(`
        alter table ${table} enable row level security;
        alter table ${table} force row level security;
        create policy ${table}_reach on ${table}
          using (vessel_id in (select reachable_vessels()))
          with check (vessel_id in (select reachable_vessels()));
      `);
    }
    // A plan is priced for whoever reaches the vessel; the terms are stated by the firm alone.
    const ownFirm = `'firm:' || firm_id = any (string_to_array(coalesce(current_setting('app.parties', true), ''), ','))`;
    this.addSql(`
      alter table yard_terms enable row level security;
      alter table yard_terms force row level security;
      create policy yard_terms_read on yard_terms for select
        using (${ownFirm} or exists (select 1 from vessel v where v.firm_id = yard_terms.firm_id));
      create policy yard_terms_add on yard_terms for insert with check (${ownFirm});
      create policy yard_terms_change on yard_terms for update using (${ownFirm}) with check (${ownFirm});
    `);
  }
}

import { Migration } from '@mikro-orm/migrations';

/** What people decided about details of parts instead of the defaults, with what it rests on. */
export class Migration20261201130400_detail_choices extends Migration {
  override up(): void {
    this.addSql(`
      create table detail_choice (
        id uuid primary key,
        vessel_id uuid not null references vessel (id),
        fitted_part_id uuid not null references fitted_part (id),
        key text not null,
        curve_id text,
        curve_version int,
        articulation text check (articulation in ('both-planes', 'one-plane', 'none', 'seized')),
        design_fatigue_factor double precision,
        evidence text not null,
        confirmed_by uuid not null references app_user (id),
        created_at timestamptz not null,
        updated_at timestamptz not null,
        version int not null default 1,
        foreign key (curve_id, curve_version) references curve (id, version)
      );
      create unique index detail_choice_key on detail_choice (fitted_part_id, key);
      create index detail_choice_vessel on detail_choice (vessel_id);
      grant select, insert, update on detail_choice to stayledger_app;
      alter table detail_choice enable row level security;
      alter table detail_choice force row level security;
      create policy detail_choice_reach on detail_choice
        using (vessel_id in (select reachable_vessels()))
        with check (vessel_id in (select reachable_vessels()));
    `);
  }
}

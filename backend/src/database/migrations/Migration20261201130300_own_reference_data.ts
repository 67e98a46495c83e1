import { Migration } from '@mikro-orm/migrations';

/**
 * A firm may add curves and constructions of its own. They are seen by that firm, and by whoever reaches a vessel on
 * which one is in use (an account must stay readable), and by nobody else. What comes with the product is written by the
 * owner at start alone; no row is ever changed.
 */
export class Migration20261201130300_own_reference_data extends Migration {
  override up(): void {
    const ownFirm = `'firm:' || firm_id = any (string_to_array(coalesce(current_setting('app.parties', true), ''), ','))`;
    const inUse = {
      // These tables are read through their own policies, so "a row exists" means "on a vessel in reach".
      curve: `exists (select 1 from part_detail d where d.curve_id = curve.id and d.curve_version = curve.version)
        or exists (select 1 from ledger_entry e where e.curve_id = curve.id and e.curve_version = curve.version)`,
      construction: `exists (select 1 from fitted_part p
        where p.construction_id = construction.id and p.construction_version = construction.version)`,
    };
    for (const table of ['curve', 'construction'] as const) {
      this.addSql(`
        create index ${table}_firm on ${table} (firm_id) where firm_id is not null;
        grant insert on ${table} to stayledger_app;
        alter table ${table} enable row level security;
        create policy ${table}_read on ${table} for select
          using (firm_id is null or ${ownFirm} or ${inUse[table]});
        create policy ${table}_add on ${table} for insert with check (firm_id is not null and ${ownFirm});
      `);
    }
  }
}

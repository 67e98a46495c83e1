import type { Pool } from 'pg';
import type { PlannedLog } from './log-plan.js';

/** What the ledger and the standings of a vessel come to: damage of each detail, and the stored share used. */
export async function accountsOf(admin: Pool, vesselId: string): Promise<Record<string, number>> {
  const { rows } = await admin.query<{ name: string; damage: number }>(
    `select d.name, sum(e.damage) as damage
       from ledger_entry e join part_detail d on d.id = e.part_detail_id
      where e.vessel_id = $1 group by d.name
     union all
     select 'share of the allowance used', allowance_used from part_standing where vessel_id = $1`,
    [vesselId],
  );
  return Object.fromEntries(rows.map(({ name, damage }) => [name, damage]));
}

/** Everything that was done twice, or left half done, in words; nothing when all is in order. */
export async function whatWasDoneTwice(admin: Pool, plan: readonly PlannedLog[]): Promise<string[]> {
  const wrong: string[] = [];
  const look = async (what: string, query: string, values: unknown[] = []): Promise<void> => {
    const { rows } = await admin.query(query, values);
    for (const row of rows.slice(0, 5)) wrong.push(`${what}: ${JSON.stringify(row)}`);
  };
  await look(
    'announced more or less than once',
    `select vessel_id, file_name, count(*) from load_log group by 1, 2 having count(*) <> 1`,
  );
  await look(
    'a log at an end nobody chose',
    `select id, file_name, state, failure from load_log
      where not (state = 'posted' and file_name <> all($1)
                 or state = 'failed' and failure ->> 'code' = 'upload-cancelled' and file_name = any($1))`,
    [plan.filter(({ cancelled }) => cancelled).map(({ name }) => name)],
  );
  for (const { name, sha256, bytes, cancelled } of plan) {
    if (cancelled) continue;
    await look(
      'stored as something else',
      `select id, file_name, sha256, received_bytes from load_log
        where file_name = $1 and (sha256 is distinct from $2 or received_bytes is distinct from $3)`,
      [name, sha256, bytes.length],
    );
  }
  await look(
    'counted more or less than once',
    `select l.id, count(c.id) from load_log l
       left join log_channel c on c.load_log_id = l.id and c.mapping_version = l.mapping_version
      where l.state = 'posted' group by l.id having count(c.id) <> 1`,
  );
  await look(
    'a count without its spectrum',
    `select c.id from log_channel c left join load_spectrum s on s.log_channel_id = c.id where s.log_channel_id is null`,
  );
  for (const action of ['load-log.announced', 'load-log.received', 'load-log.posted', 'load-log.counted']) {
    await look(
      `${action} more or less than once`,
      `select l.id, l.mapping_version, count(a.id) from load_log l
         left join audit_event a on a.subject_id = l.id::text and a.action = $1
        where l.state = 'posted' group by l.id having count(a.id) <> 1`,
      [action],
    );
  }
  await look('a job that is not at its end', `select * from job where state in ('queued', 'running')`);
  await look(
    'a job done twice',
    `select subject_id, input_version, count(*) from job where state = 'done' group by 1, 2 having count(*) > 1`,
  );
  await look(
    'recorded more or less than once',
    `select l.id, d.name, count(e.id)
       from load_log l
       join part_detail d on d.vessel_id = l.vessel_id
       left join ledger_entry e on e.part_detail_id = d.id and e.load_log_id = l.id and e.kind = 'recorded'
            and not exists (select 1 from ledger_entry r where r.reverses_id = e.id)
      where l.state = 'posted' and exists (select 1 from ledger_entry x where x.part_detail_id = d.id)
      group by l.id, d.name having count(e.id) <> 1`,
  );
  await look(
    'a chain with a gap',
    `select part_detail_id, count(*), max(sequence) from ledger_entry group by 1 having count(*) <> max(sequence)`,
  );
  await look(
    'a chain that does not fit',
    `select e.id from ledger_entry e join ledger_entry p
         on p.part_detail_id = e.part_detail_id and p.sequence = e.sequence - 1
      where e.previous_hash <> p.hash`,
  );
  return wrong;
}

import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import type { EntityManager } from '@mikro-orm/postgresql';
import { constructionsFileSchema } from '@stayledger/shared/contracts/constructions';
import { curvesFileSchema } from '@stayledger/shared/contracts/curves';
import { canonicalJson, type CanonicalValue } from '../../ledger/canonical-json.js';

/** Files of the reference data that have a table. */
export const REFERENCE_FILES = {
  curve: require.resolve('@stayledger/reference-data/curves.json'),
  construction: require.resolve('@stayledger/reference-data/constructions.json'),
} as const;

interface ReferenceRow {
  id: string;
  version: number;
  name: string;
}

/** Somebody changed a published version instead of adding a new one. Accounts rest on it, so it is refused. */
export class ReferenceChangedError extends Error {
  constructor(table: string, id: string, version: number) {
    super(
      `The ${table} ${id}, version ${version}, is stored with other content. A published version never changes: ` +
        `give the correction the version ${version + 1}.`,
    );
    this.name = 'ReferenceChangedError';
  }
}

/** Adds what the reference data have and the database has not. Run at every start; needs the owner. */
export async function seedReferenceData(em: EntityManager, now: Date): Promise<{ added: number }> {
  const { curves } = curvesFileSchema.parse(read(REFERENCE_FILES.curve));
  const { constructions } = constructionsFileSchema.parse(read(REFERENCE_FILES.construction));
  return em.transactional(async (inner) => {
    let added = 0;
    for (const curve of curves) added += await addVersion(inner, 'curve', curve, now);
    for (const construction of constructions)
      added += await addVersion(inner, 'construction', construction, now);
    return { added };
  });
}

/** @returns 1 when the version was new */
export async function addVersion(
  em: EntityManager,
  table: 'curve' | 'construction',
  row: ReferenceRow,
  now: Date,
): Promise<number> {
  const hash = createHash('sha256')
    .update(canonicalJson(JSON.parse(JSON.stringify(row)) as CanonicalValue))
    .digest('hex');
  const inserted: unknown[] = await em.execute(
    `insert into ${table} (id, version, firm_id, name, data, data_hash, created_at)
      values (?, ?, null, ?, ?, ?, ?) on conflict do nothing returning id`,
    [row.id, row.version, row.name, JSON.stringify(row), hash, now],
  );
  if (inserted.length > 0) return 1;
  const [stored]: { data_hash: string }[] = await em.execute(
    `select data_hash from ${table} where id = ? and version = ?`,
    [row.id, row.version],
  );
  if (stored.data_hash !== hash) throw new ReferenceChangedError(table, row.id, row.version);
  return 0;
}

function read(path: string): unknown {
  return JSON.parse(readFileSync(path, 'utf8'));
}

import { createHash } from 'node:crypto';
import type { Pool } from 'pg';
import type { Role } from '@stayledger/shared/permissions/permissions';
import { hashPassword } from '../auth/passwords.js';
import type { Clock } from '../common/clock/clock.js';
import { newId } from '../common/ids/new-id.js';
import type { FIRM_ROLES } from '../firms/membership.entity.js';
import type { AccessRole } from '../vessels/vessel-access.entity.js';

export const TEST_PASSWORD = 'a long enough test password';
let testPasswordHash: Promise<string> | undefined;

type FirmRole = (typeof FIRM_ROLES)[number];
const FIRM_KIND_OF: Record<FirmRole, string> = {
  rigger: 'rigging',
  surveyor: 'survey',
  insurer: 'insurer',
  administrator: 'service',
};

export interface TestUser {
  id: string;
  email: string;
  name: string;
  /** The firm that gives the role; an owner has none. */
  firmId: string | null;
}
export interface TestVessel {
  id: string;
  firmId: string;
  name: string;
  zone: string;
}

/**
 * Rows with overrides, parents made when missing. They are written as the superuser, past row level security, so that
 * a test can arrange any world; the application under test still sees only what it may.
 */
export class Factories {
  private sequence = 0;

  constructor(
    private readonly admin: Pool,
    private readonly clock: Clock,
  ) {}

  async firm(override: { name?: string; kind?: string } = {}): Promise<{ id: string; name: string }> {
    const firm = {
      id: newId(),
      name: override.name ?? `Firm ${this.next()}`,
      kind: override.kind ?? 'rigging',
    };
    await this.insert('firm', { ...firm, ...this.stamps() });
    return firm;
  }

  /** A person without any role. */
  async person(override: { email?: string; name?: string; active?: boolean } = {}): Promise<TestUser> {
    const n = this.next();
    testPasswordHash ??= hashPassword(TEST_PASSWORD);
    const user = {
      id: newId(),
      email: override.email ?? `person-${n}@example.test`,
      name: override.name ?? `Person ${n}`,
    };
    await this.insert('app_user', {
      ...user,
      password_hash: await testPasswordHash,
      active: override.active ?? true,
      sessions_valid_from: this.clock.now(),
      ...this.stamps(),
    });
    return { ...user, firmId: null };
  }

  /** A person with a role through a firm (made when not given). */
  async member(
    role: FirmRole,
    override: { firmId?: string; email?: string; name?: string } = {},
  ): Promise<TestUser & { firmId: string }> {
    const user = await this.person(override);
    const firmId = override.firmId ?? (await this.firm({ kind: FIRM_KIND_OF[role] })).id;
    await this.insert('membership', {
      id: newId(),
      user_id: user.id,
      firm_id: firmId,
      role,
      created_at: this.clock.now(),
    });
    return { ...user, firmId };
  }

  /** Somebody in this role who reaches the vessel: a member of a firm with access, or an owner. */
  async userOn(vessel: TestVessel, role: Role, override: { firmId?: string } = {}): Promise<TestUser> {
    if (role === 'owner') {
      const owner = await this.person();
      await this.grant(vessel, `user:${owner.id}`, 'owner');
      return owner;
    }
    const member = await this.member(role, override);
    if (role !== 'administrator') await this.grant(vessel, `firm:${member.firmId}`, role);
    return member;
  }

  /** A vessel with its looking-after firm's access. */
  async vessel(override: Partial<TestVessel> & { buildYear?: number | null } = {}): Promise<TestVessel> {
    const vessel = {
      id: override.id ?? newId(),
      firmId: override.firmId ?? (await this.firm()).id,
      name: override.name ?? `Vessel ${this.next()}`,
      zone: override.zone ?? 'Europe/Oslo',
    };
    await this.insert('vessel', {
      id: vessel.id,
      firm_id: vessel.firmId,
      name: vessel.name,
      rig_type: 'masthead-sloop',
      zone: vessel.zone,
      build_year: override.buildYear ?? null,
      ...this.stamps(),
    });
    await this.grant(vessel, `firm:${vessel.firmId}`, 'rigger');
    return vessel;
  }

  async grant(
    vessel: { id: string },
    party: string,
    role: AccessRole,
    override: { endsAt?: Date | null } = {},
  ): Promise<void> {
    await this.insert('vessel_access', {
      id: newId(),
      vessel_id: vessel.id,
      party,
      role,
      ends_at: override.endsAt ?? null,
      created_at: this.clock.now(),
    });
  }

  async position(
    vessel: { id: string },
    override: { kind?: string; side?: string; label?: string; mast?: string } = {},
  ): Promise<{ id: string; vesselId: string; label: string }> {
    const position = { id: newId(), label: override.label ?? `Cap shroud, port ${this.next()}` };
    await this.insert('position', {
      ...position,
      vessel_id: vessel.id,
      kind: override.kind ?? 'cap-shroud',
      side: override.side ?? 'port',
      mast: override.mast ?? 'main',
      ...this.stamps(),
    });
    return { ...position, vesselId: vessel.id };
  }

  /** Any row of any table, columns as the database names them. Objects go in as JSON. */
  async insert(table: string, row: Record<string, unknown>): Promise<void> {
    const columns = Object.keys(row);
    const values = columns.map((column) => {
      const value = row[column];
      const plain =
        value === null || typeof value !== 'object' || value instanceof Date || value instanceof Uint8Array;
      return plain ? value : JSON.stringify(value);
    });
    await this.admin.query(
      `insert into "${table}" (${columns.map((column) => `"${column}"`).join(', ')})
       values (${columns.map((_, index) => `$${index + 1}`).join(', ')})`,
      values,
    );
  }

  /** A curve or construction of its own, for tests that must not hang on the product's reference data. */
  async reference(table: 'curve' | 'construction', id: string, data: unknown, version = 1): Promise<void> {
    await this.insert(table, {
      id,
      version,
      name: id,
      data: JSON.stringify(data),
      data_hash: createHash('sha256').update(JSON.stringify(data)).digest('hex'),
      created_at: this.clock.now(),
    });
  }

  private next(): number {
    return ++this.sequence;
  }

  private stamps(): { created_at: Date; updated_at: Date } {
    return { created_at: this.clock.now(), updated_at: this.clock.now() };
  }
}

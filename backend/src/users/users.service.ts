import { EntityManager, LockMode } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import { preferencesSchema, type SessionDto } from '@stayledger/shared/contracts/auth';
import type { ChangePasswordInput, UpdateProfileInput, UserDto } from '@stayledger/shared/contracts/users';
import type { Request } from 'express';
import { z } from 'zod';
import { AuditService } from '../audit/audit.service.js';
import { hashPassword, passwordMatches } from '../auth/passwords.js';
import type { Principal } from '../auth/principal.js';
import { toSession } from '../auth/session.mapper.js';
import { SessionsService } from '../auth/sessions.service.js';
import { Clock } from '../common/clock/clock.js';
import { InvalidRequestError, VersionConflictError } from '../common/errors/app-error.js';
import { decodeCursor, toPage, type Page } from '../common/pagination/cursor.js';
import { User } from './user.entity.js';

interface Row {
  id: string;
  name: string;
  email: string;
  active: boolean;
  created_at: string;
  memberships: UserDto['memberships'];
}

const cursorSchema = z.tuple([z.string(), z.uuid()]);

@Injectable()
export class UsersService {
  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
    private readonly audit: AuditService,
    private readonly sessions: SessionsService,
  ) {}

  async updateProfile(me: Principal, input: UpdateProfileInput): Promise<SessionDto> {
    const user = await this.lock(me);
    if (user.version !== input.version) throw new VersionConflictError(toSession(this.asStored(me, user)));
    if (input.name !== undefined) user.name = input.name;
    if (input.preferences !== undefined) user.preferences = { ...user.preferences, ...input.preferences };
    user.updatedAt = this.clock.now();
    await this.em.flush();
    await this.audit.record(this.em, {
      action: 'user.profile-updated',
      subjectKind: 'user',
      subjectId: user.id,
      userId: me.userId,
      data: { fields: Object.keys(input).filter((key) => key !== 'version') },
    });
    return toSession(this.asStored(me, user));
  }

  /** Ends every session of the person, wherever it is, and begins a new one for the browser that asked. */
  async changePassword(me: Principal, input: ChangePasswordInput, request: Request): Promise<void> {
    const user = await this.lock(me);
    if (!(await passwordMatches(input.currentPassword, user.passwordHash))) {
      throw new InvalidRequestError({ currentPassword: ['This is not your current password.'] });
    }
    user.passwordHash = await hashPassword(input.newPassword);
    user.sessionsValidFrom = this.clock.now();
    user.updatedAt = this.clock.now();
    await this.em.flush();
    // The session of this request is left to the store, which would wait for our lock on its row.
    await this.em.execute(
      `delete from session where sess -> 'passport' -> 'user' ->> 'userId' = ? and sid <> ?`,
      [user.id, request.sessionID],
    );
    await this.audit.record(this.em, {
      action: 'user.password-changed',
      subjectKind: 'user',
      subjectId: user.id,
      userId: me.userId,
    });
    await this.sessions.renew(request, me);
  }

  /** By name; for administrators. */
  async list(query: { cursor?: string; limit: number }): Promise<Page<UserDto>> {
    const after = decodeCursor(query.cursor, cursorSchema);
    const rows: Row[] = await this.em.execute(
      `select u.id, u.name, u.email, u.active, u.created_at,
              coalesce(jsonb_agg(jsonb_build_object('role', m.role, 'firmId', f.id, 'firmName', f.name)
                order by f.name, m.role) filter (where m.id is not null), '[]') as memberships
         from app_user u
         left join membership m on m.user_id = u.id and m.ended_at is null
         left join firm f on f.id = m.firm_id
        where ?::text is null or (u.name, u.id) > (?::text, ?::uuid)
        group by u.id order by u.name, u.id limit ?`,
      [after?.[0] ?? null, after?.[0] ?? null, after?.[1] ?? null, query.limit + 1],
    );
    const page = toPage(rows, query.limit, ({ name, id }) => [name, id]);
    return {
      items: page.rows.map(({ created_at, ...user }) => ({
        ...user,
        createdAt: new Date(created_at).toISOString(),
      })),
      nextCursor: page.nextCursor,
    };
  }

  private asStored(me: Principal, user: User): Principal {
    const preferences = preferencesSchema.parse(user.preferences);
    return { ...me, name: user.name, preferences, version: user.version };
  }

  private lock(me: Principal): Promise<User> {
    return this.em.findOneOrFail(
      User,
      { id: me.userId },
      { lockMode: LockMode.PESSIMISTIC_WRITE, refresh: true },
    );
  }
}

import { createHmac } from 'node:crypto';
import { EntityManager } from '@mikro-orm/postgresql';
import {
  Inject,
  Injectable,
  type CallHandler,
  type ExecutionContext,
  type NestInterceptor,
} from '@nestjs/common';
import type { Request, Response } from 'express';
import { from, lastValueFrom, type Observable } from 'rxjs';
import { z } from 'zod';
import { Clock } from '../clock/clock.js';
import { ENV } from '../../config/config.module.js';
import type { Env } from '../../config/env.js';
import { IdempotencyMismatchError, InvalidRequestError } from '../errors/app-error.js';

const KEEP_MS = 24 * 3_600_000;

interface Stored {
  request_hash: string;
  status: number;
  reply: unknown;
}

/**
 * Carries out a creating request once per `Idempotency-Key` of a person and gives the same reply to its repetitions
 * for 24 hours. The key is written in the transaction of the deed: a second request with the same key waits for the
 * first to commit (and then repeats its reply) or to fail (and then does the work itself).
 */
@Injectable()
export class IdempotencyInterceptor implements NestInterceptor {
  constructor(
    private readonly em: EntityManager,
    private readonly clock: Clock,
    @Inject(ENV) private readonly env: Env,
  ) {}

  intercept(context: ExecutionContext, next: CallHandler): Observable<unknown> {
    const http = context.switchToHttp();
    const request = http.getRequest<Request>();
    const key = request.get('idempotency-key');
    if (key === undefined || request.method !== 'POST' || !request.user) return next.handle();
    if (!z.uuid().safeParse(key).success) {
      throw new InvalidRequestError({
        'Idempotency-Key': ['Send a UUID, a new one for each thing to create.'],
      });
    }
    return from(this.once(key, request, http.getResponse<Response>(), next));
  }

  private async once(key: string, request: Request, response: Response, next: CallHandler): Promise<unknown> {
    const userId = request.user?.userId ?? '';
    const route = request.path;
    const requestHash = this.hashOf(route, request.body);
    const now = this.clock.now();
    await this.em.execute('delete from idempotency_key where user_id = ? and created_at < ?', [
      userId,
      new Date(now.getTime() - KEEP_MS),
    ]);
    const inserted: unknown[] = await this.em.execute(
      `insert into idempotency_key (user_id, key, route, request_hash, created_at) values (?, ?, ?, ?, ?)
        on conflict do nothing returning key`,
      [userId, key, route, requestHash, now],
    );
    if (inserted.length === 0) {
      const [stored]: Stored[] = await this.em.execute(
        'select request_hash, status, reply from idempotency_key where user_id = ? and key = ?',
        [userId, key],
      );
      if (stored.request_hash !== requestHash) throw new IdempotencyMismatchError();
      response.status(stored.status);
      return stored.reply ?? undefined;
    }
    const reply: unknown = await lastValueFrom(next.handle(), { defaultValue: undefined });
    await this.em.flush();
    await this.em.execute('update idempotency_key set status = ?, reply = ? where user_id = ? and key = ?', [
      response.statusCode,
      reply === undefined ? null : JSON.stringify(reply),
      userId,
      key,
    ]);
    return reply;
  }

  /**
   * The same request has the same bytes: our client repeats what it sent, it does not build it anew. Keyed, since a
   * body may hold a password, which a plain hash would lay open to guessing.
   */
  private hashOf(route: string, body: unknown): string {
    return createHmac('sha256', this.env.SESSION_SECRET)
      .update(route)
      .update('\0')
      .update(JSON.stringify(body ?? null))
      .digest('hex');
  }
}

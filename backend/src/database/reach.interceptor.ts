import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable, type CallHandler, type ExecutionContext, type NestInterceptor } from '@nestjs/common';
import type { Request } from 'express';
import { from, lastValueFrom, type Observable } from 'rxjs';
import { reachOf } from '../auth/principal.js';
import { inReach } from './reach.js';

/**
 * Runs each handler in one transaction that sees what the person asking may see. The reply is sent after the commit;
 * an error undoes everything the handler wrote. Streams outlive the transaction, so a download opens its file first.
 */
@Injectable()
export class ReachInterceptor implements NestInterceptor {
  constructor(private readonly em: EntityManager) {}

  intercept(context: ExecutionContext, next: CallHandler): Observable<unknown> {
    const { user } = context.switchToHttp().getRequest<Request>();
    return from(
      inReach(this.em, reachOf(user), () => lastValueFrom(next.handle(), { defaultValue: undefined })),
    );
  }
}

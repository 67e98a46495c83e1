import { AsyncLocalStorage } from 'node:async_hooks';
import { Logger } from '@nestjs/common';
import type { RequestHandler } from 'express';
import { newId } from '../ids/new-id.js';

interface RequestContext {
  requestId: string;
}

const storage = new AsyncLocalStorage<RequestContext>();
const logger = new Logger('Http');

/** The id of the request being served, for log lines and error replies; undefined outside of one. */
export function currentRequestId(): string | undefined {
  return storage.getStore()?.requestId;
}

/**
 * Gives each request an id, sends it back as X-Request-Id, and notes the outcome. The line carries no query, no body
 * and no header: those hold what people typed, and cookies.
 */
export const requestContext: RequestHandler = (request, response, next) => {
  const requestId = newId();
  const begun = performance.now();
  response.setHeader('X-Request-Id', requestId);
  storage.run({ requestId }, () => {
    response.on('finish', () => {
      if (!request.originalUrl.startsWith('/api')) return;
      logger.debug({
        method: request.method,
        path: request.originalUrl.split('?')[0],
        status: response.statusCode,
        ms: Math.round(performance.now() - begun),
        userId: request.user?.userId,
      });
    });
    next();
  });
};

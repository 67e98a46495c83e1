import { AsyncLocalStorage } from 'node:async_hooks';
import type { Readable } from 'node:stream';
import { EntityManager } from '@mikro-orm/postgresql';
import { Inject, Injectable, Logger } from '@nestjs/common';
import type { ErrorCode, ErrorReply } from '@stayledger/shared/contracts/errors';
import { LOAD_LOG_SIZE_MAX_BYTES } from '@stayledger/shared/contracts/load-logs';
import { idSchema } from '@stayledger/shared/contracts/values';
import { DataStore, Server, Upload } from '@tus/server';
import type { RequestHandler, Response } from 'express';
import { type Principal, principalOf, reachOf } from '../auth/principal.js';
import {
  AppError,
  ForbiddenError,
  InvalidRequestError,
  NotFoundError,
  StateConflictError,
  UnavailableError,
} from '../common/errors/app-error.js';
import { databaseIsAway } from '../common/errors/database-away.js';
import { currentRequestId } from '../common/http/request-context.js';
import { inReach } from '../database/reach.js';
import { LOG_STORAGE, type LogStorage, type StorageKey } from '../storage/log-storage.js';
import type { LoadLog } from './load-log.entity.js';
import { LoadLogsService } from './load-logs.service.js';
import { LogReceiver, UPLOAD_EXPIRY_MS } from './log-receiver.js';

export const UPLOADS_PATH = '/api/uploads';

/** Who sends, and which announced log the bytes belong to; the protocol's own request carries neither. */
interface UploadScope {
  me: Principal;
  response: Response;
  log: LoadLog | null;
}

/**
 * Takes the bytes of announced load logs over the tus protocol. The upload's id is the id of its load log, so reach
 * is asked of the database at every request and the state of an upload is the file itself.
 */
@Injectable()
export class UploadsHandler {
  /** Goes behind the session middleware and the cross-site rule, outside the JSON body parser. */
  readonly handle: RequestHandler;

  private readonly logger = new Logger(UploadsHandler.name);
  private readonly scopes = new AsyncLocalStorage<UploadScope>();

  constructor(
    private readonly em: EntityManager,
    private readonly logs: LoadLogsService,
    private readonly receiver: LogReceiver,
    @Inject(LOG_STORAGE) private readonly storage: LogStorage,
  ) {
    const server = new Server({
      path: UPLOADS_PATH,
      relativeLocation: true,
      allowedOrigins: [],
      maxSize: LOAD_LOG_SIZE_MAX_BYTES,
      datastore: new LoadLogStore(
        storage,
        () => this.announcedLog(),
        () => this.cancel(),
      ),
      namingFunction: (_request, metadata) => announcedId(metadata?.loadLogId),
      onIncomingRequest: (_request, id) => this.admit(id),
      onUploadCreate: async (_request, upload) => {
        await this.begin(upload);
        return {};
      },
      onUploadFinish: async () => {
        await this.receiver.takeOver(keyOf(this.announcedLog()));
        return {};
      },
      onResponseError: (_request, error) => this.reply(error),
    });
    this.handle = (request, response, next) => {
      const me = principalOf(request);
      if (!me.permissions.has('load-logs:upload')) throw new ForbiddenError();
      takeCallbackAtEnd(response);
      this.scopes.run({ me, response, log: null }, () => {
        server.handle(request, response).catch(next);
      });
    };
  }

  /** Lets a request through to its upload: the log is in reach and may be uploaded to. */
  private async admit(id: string): Promise<void> {
    const scope = this.scope();
    if (!idSchema.safeParse(id).success) throw new NotFoundError();
    scope.log = await inReach(this.em.fork(), reachOf(scope.me), () =>
      this.logs.findOrFail(scope.me, id, 'load-logs:upload'),
    );
    const received = await this.storage.received(keyOf(scope.log));
    // All bytes are here but the taking over broke off: whoever comes back to resume sets it going again.
    if (scope.log.state === 'receiving' && received?.bytes === scope.log.sizeBytes) {
      await this.receiver.takeOver(keyOf(scope.log));
    }
  }

  private async cancel(): Promise<void> {
    const log = this.announcedLog();
    if (log.state !== 'receiving') {
      throw new StateConflictError(
        'This file has arrived in full. Set the log aside instead of cancelling it.',
      );
    }
    await this.receiver.cancel(keyOf(log), this.scope().me.userId);
  }

  private async begin(upload: Upload): Promise<void> {
    const log = this.announcedLog();
    if (upload.size !== log.sizeBytes) {
      throw new InvalidRequestError(
        {},
        `This log was announced with ${log.sizeBytes} bytes, and the upload has ${upload.size}. Add the log anew.`,
      );
    }
    if (log.state === 'failed') {
      throw new InvalidRequestError({}, 'This log has failed and takes no more bytes. Add the log anew.');
    }
    await this.logs.requireRoom(log.sizeBytes);
  }

  private scope(): UploadScope {
    const scope = this.scopes.getStore();
    if (!scope) throw new Error('an upload outside its request');
    return scope;
  }

  private announcedLog(): LoadLog {
    const { log } = this.scope();
    if (!log) throw new NotFoundError();
    return log;
  }

  /** Our errors in our envelope; the protocol's own in the protocol's words. */
  private reply(
    error: Error | { status_code: number; body: string },
  ): { status_code: number; body: string } | undefined {
    if ('status_code' in error) return undefined;
    const known = databaseIsAway(error) ? new UnavailableError({ cause: error }) : error;
    if (known instanceof AppError) {
      const { response } = this.scope();
      if (known.retryAfterS !== undefined) response.setHeader('Retry-After', String(known.retryAfterS));
      return envelope(known.status, known.code, known.message);
    }
    this.logger.error(error.message, error.stack);
    return envelope(500, 'internal', 'The bytes could not be stored. Go on with the upload in a moment.');
  }
}

/** The announced logs as tus sees them; what has arrived is asked of the files every time. */
class LoadLogStore extends DataStore {
  override extensions = ['creation', 'expiration', 'termination'];

  constructor(
    private readonly storage: LogStorage,
    private readonly announced: () => LoadLog,
    private readonly cancel: () => Promise<void>,
  ) {
    super();
  }

  override async create(upload: Upload): Promise<Upload> {
    const log = this.announced();
    await this.storage.begin(keyOf(log));
    upload.creation_date = log.createdAt.toISOString();
    return upload;
  }

  override async getUpload(id: string): Promise<Upload> {
    const log = this.announced();
    const received = await this.storage.received(keyOf(log));
    if (!received) throw new NotFoundError();
    return new Upload({
      id,
      size: log.sizeBytes,
      offset: received.bytes,
      creation_date: log.createdAt.toISOString(),
    });
  }

  override async write(source: Readable, _id: string, offset: number): Promise<number> {
    const key = keyOf(this.announced());
    const received = await this.storage.received(key);
    if (received?.complete) return received.bytes;
    return this.storage.append(key, offset, source);
  }

  override remove(): Promise<void> {
    return this.cancel();
  }

  override getExpiration(): number {
    return UPLOAD_EXPIRY_MS;
  }
}

/**
 * The protocol's library ends replies with `end(callback)`, which Node allows; the session middleware wraps `end` and
 * takes a first argument for contents. Here the callback is taken off before it gets there.
 */
function takeCallbackAtEnd(response: Response): void {
  const end = response.end.bind(response) as (...values: unknown[]) => Response;
  response.end = ((...values: unknown[]) => {
    const callback = values.at(-1);
    if (typeof callback !== 'function') return end(...values);
    response.once('finish', () => {
      callback();
    });
    return end(...values.slice(0, -1));
  }) as Response['end'];
}

function keyOf(log: LoadLog): StorageKey {
  return { vesselId: log.vessel, loadLogId: log.id };
}

function announcedId(id: string | null | undefined): string {
  const parsed = idSchema.safeParse(id);
  if (parsed.success) return parsed.data;
  throw new InvalidRequestError({}, 'Announce the log first and name it in the metadata as loadLogId.');
}

function envelope(
  status_code: number,
  code: ErrorCode,
  message: string,
): { status_code: number; body: string } {
  const body: ErrorReply = { code, message, requestId: currentRequestId() ?? 'none' };
  return { status_code, body: JSON.stringify(body) };
}

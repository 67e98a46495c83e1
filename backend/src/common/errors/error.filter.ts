import { DriverException, OptimisticLockError, UniqueConstraintViolationException } from '@mikro-orm/core';
import { Catch, HttpException, Logger, type ArgumentsHost, type ExceptionFilter } from '@nestjs/common';
import { ThrottlerException } from '@nestjs/throttler';
import type { ErrorCode, ErrorReply } from '@stayledger/shared/contracts/errors';
import type { Response } from 'express';
import { ZodSerializationException, ZodValidationException } from 'nestjs-zod';
import { z } from 'zod';
import { currentRequestId } from '../http/request-context.js';
import {
  AppError,
  DuplicateError,
  InvalidRequestError,
  NotFoundError,
  PayloadTooLargeError,
  TooManyAttemptsError,
  UnavailableError,
  UnsupportedMediaTypeError,
} from './app-error.js';
import { databaseIsAway } from './database-away.js';

/** The only exit for errors: one envelope, an id to find the log line by, and no detail of an accident. */
@Catch()
export class ErrorFilter implements ExceptionFilter {
  private readonly logger = new Logger(ErrorFilter.name);

  catch(exception: unknown, host: ArgumentsHost): void {
    const response = host.switchToHttp().getResponse<Response>();
    const { status, body, retryAfterS } = this.replyTo(exception);
    if (response.headersSent) {
      // A download broke half way; the only honest end is a cut connection.
      response.destroy();
      return;
    }
    if (retryAfterS !== undefined) response.setHeader('Retry-After', String(retryAfterS));
    response.status(status).json(body);
  }

  private replyTo(exception: unknown): { status: number; body: ErrorReply; retryAfterS?: number } {
    const requestId = currentRequestId() ?? 'none';
    const error = asAppError(exception);
    if (error instanceof AppError) {
      if (error.status >= 500) this.logger.warn({ code: error.code, cause: textOf(error.cause) });
      const { code, message, fieldErrors, current } = error;
      return {
        status: error.status,
        body: { code, message, fieldErrors, current, requestId },
        retryAfterS: error.retryAfterS,
      };
    }
    this.logger.error(textOf(exception), framesOf(exception));
    const code: ErrorCode = 'internal';
    const message =
      'The service made a mistake; nothing was changed. If it happens again, quote the request id.';
    return { status: 500, body: { code, message, requestId } };
  }
}

/** Knows what other libraries throw. Whatever it does not know stays as it is and becomes a 500. */
function asAppError(exception: unknown): unknown {
  if (exception instanceof AppError) return exception;
  if (exception instanceof ZodValidationException) return invalid(exception.getZodError());
  if (exception instanceof ZodSerializationException) {
    return new Error('A reply does not match its contract', { cause: exception.getZodError() });
  }
  if (exception instanceof ThrottlerException) return new TooManyAttemptsError(60);
  if (exception instanceof OptimisticLockError) return new ConcurrentChangeError();
  if (exception instanceof UniqueConstraintViolationException) {
    return new DuplicateError('The same entry exists already. Reload to see it.', { cause: exception });
  }
  if (databaseIsAway(exception)) return new UnavailableError({ cause: exception });
  return ofStatus(exception);
}

class ConcurrentChangeError extends AppError {
  readonly code = 'version-conflict';
  readonly status = 409;
  constructor() {
    super('This was changed by somebody else at the same moment. Reload and try again.');
  }
}

/** Nest's exceptions and body-parser's errors both carry a status. */
function ofStatus(exception: unknown): unknown {
  const status =
    exception instanceof HttpException
      ? exception.getStatus()
      : ((exception as { status?: unknown } | null)?.status ?? 500);
  switch (status) {
    case 400:
      return new InvalidRequestError(
        {},
        'The request could not be read. Send well-formed JSON and addresses.',
      );
    case 404:
      return new NotFoundError();
    case 413:
      return new PayloadTooLargeError('The request is larger than this address takes. Send a smaller one.');
    case 415:
      return new UnsupportedMediaTypeError(
        'Send JSON in UTF-8 with the header Content-Type: application/json.',
      );
    default:
      return exception;
  }
}

function invalid(error: unknown): InvalidRequestError {
  const fieldErrors: Record<string, string[]> = {};
  if (error instanceof z.ZodError) {
    for (const issue of error.issues) {
      for (const path of pathsOf(issue)) (fieldErrors[path] ??= []).push(issue.message);
    }
  }
  return new InvalidRequestError(fieldErrors);
}

function pathsOf(issue: z.core.$ZodIssue): string[] {
  // An unknown key is reported on the object that holds it; people look for it at the key itself.
  if (issue.code === 'unrecognized_keys') return issue.keys.map((key) => [...issue.path, key].join('.'));
  return [issue.path.join('.')];
}

/**
 * What went wrong, without what somebody typed. The words of a database hold statements, values and whole rows ("Failing
 * row contains …"), so of those only the state and the names of table, column and constraint are kept. A cause is told
 * as well.
 */
function textOf(value: unknown): string {
  if (!(value instanceof Error)) return String(value);
  const text = `${value.name}: ${databaseWords(value) ?? value.message}`;
  return value.cause === undefined ? text : `${text} (${textOf(value.cause)})`;
}

interface DatabaseError {
  code?: unknown;
  table?: unknown;
  column?: unknown;
  constraint?: unknown;
}

/** State and names of an error that PostgreSQL sent, whichever library wraps it; null for any other error. */
function databaseWords(error: Error & DatabaseError): string | null {
  const { code } = error;
  const isSent = typeof code === 'string' && /^[0-9A-Z]{5}$/.test(code) && 'severity' in error;
  // What the driver says by itself stands behind the statement it was about.
  if (!isSent) return error instanceof DriverException ? (error.message.split(' - ').at(-1) ?? '') : null;
  const names = (['table', 'column', 'constraint'] as const).flatMap((kind) =>
    typeof error[kind] === 'string' ? [`${kind} ${error[kind]}`] : [],
  );
  // Class 42 speaks of the statement itself: what is missing is a name of ours.
  const missing = /(?:relation|column|function|type) "?[\w.]+"?[^"]{0,20} does not exist/.exec(error.message);
  return [`SQLSTATE ${code}`, ...names, ...(code.startsWith('42') && missing ? [missing[0]] : [])].join(', ');
}

/** The frames of a stack without its first lines, which repeat the message. */
function framesOf(value: unknown): string | undefined {
  if (!(value instanceof Error) || value.stack === undefined) return undefined;
  return value.stack
    .split('\n')
    .filter((line) => /^ +at /.test(line))
    .join('\n');
}

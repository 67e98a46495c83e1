import type { ErrorCode, ErrorReply } from '@stayledger/shared/contracts/errors';

/** A refusal of the API, as its envelope said it. */
export class ApiError extends Error {
  readonly status: number;
  readonly code: ErrorCode;
  readonly fieldErrors: Record<string, string[]>;
  /** The stored state, on a version conflict. */
  readonly current: unknown;
  readonly requestId: string;

  constructor(status: number, reply: ErrorReply) {
    super(reply.message);
    this.name = 'ApiError';
    this.status = status;
    this.code = reply.code;
    this.fieldErrors = reply.fieldErrors ?? {};
    this.current = reply.current;
    this.requestId = reply.requestId;
  }
}

/** The server could not be reached, or what answered was not our server. */
export class UnreachableError extends Error {
  constructor(cause: unknown) {
    super('The server could not be reached. Check the connection and try again; nothing was lost.', {
      cause,
    });
    this.name = 'UnreachableError';
  }
}

/** A reply that does not keep the contract: a fault of ours, named with its place. */
export class ReplyMismatchError extends Error {
  constructor(path: string, where: string) {
    super(
      `The reply of ${path} was not understood (${where}). Reload the page; if it stays, report this line.`,
    );
    this.name = 'ReplyMismatchError';
  }
}

export function isApiError(error: unknown, code?: ErrorCode): error is ApiError {
  return error instanceof ApiError && (code === undefined || error.code === code);
}

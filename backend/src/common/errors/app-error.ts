import type { ErrorCode } from '@stayledger/shared/contracts/errors';

/** What a service throws when it has to say no. The filter turns it into the one error envelope. */
export abstract class AppError extends Error {
  abstract readonly code: ErrorCode;
  abstract readonly status: number;
  readonly fieldErrors?: Record<string, string[]>;
  /** The stored state, where the client needs it to decide what to do next. */
  readonly current?: unknown;
  readonly retryAfterS?: number;

  constructor(message: string, options?: { cause?: unknown }) {
    super(message, options);
    this.name = new.target.name;
  }
}

/** Absent and out of reach alike: the text says nothing about which, nor repeats the id. */
export class NotFoundError extends AppError {
  readonly code = 'not-found';
  readonly status = 404;
  constructor() {
    super('There is nothing at this address, or it is not shared with you.');
  }
}

export class SignedOutError extends AppError {
  readonly code = 'signed-out';
  readonly status = 401;
  constructor() {
    super('Sign in to go on.');
  }
}

/** One text for an unknown address, a wrong password and a closed account, so that none can be told apart. */
export class WrongCredentialsError extends AppError {
  readonly code = 'wrong-credentials';
  readonly status = 401;
  constructor() {
    super('The e-mail address or the password is not right.');
  }
}

export class TooManyAttemptsError extends AppError {
  readonly code = 'too-many-attempts';
  readonly status = 429;
  constructor(override readonly retryAfterS: number) {
    super(`Too many attempts. Try again in ${Math.max(1, Math.ceil(retryAfterS / 60))} min.`);
  }
}

export class ForbiddenError extends AppError {
  readonly code = 'forbidden';
  readonly status = 403;
  constructor(message = 'Your role does not include this.') {
    super(message);
  }
}

export class CrossSiteError extends AppError {
  readonly code = 'cross-site';
  readonly status = 403;
  constructor() {
    super('This request did not come from the application itself and was refused.');
  }
}

/** The request can be read but cannot be meant. Keys of `fieldErrors` are paths: `channels.0.unit`. */
export class InvalidRequestError extends AppError {
  readonly code = 'invalid-request';
  readonly status = 400;
  constructor(
    override readonly fieldErrors: Record<string, string[]>,
    message = 'Some entries need another look.',
  ) {
    super(message);
  }
}

/** Somebody else saved in between. `current` is the row as it stands, in the shape of the reply. */
export class VersionConflictError extends AppError {
  readonly code = 'version-conflict';
  readonly status = 409;
  constructor(override readonly current: unknown) {
    super('This was changed by somebody else in the meantime. Compare both states and save again.');
  }
}

/** The thing is not in a state that allows this. The message says which state and what mends it. */
export class StateConflictError extends AppError {
  readonly code = 'state-conflict';
  readonly status = 409;
  constructor(
    message: string,
    override readonly current?: unknown,
  ) {
    super(message);
  }
}

export class DuplicateError extends AppError {
  readonly code = 'duplicate';
  readonly status = 409;
}

export class IdempotencyMismatchError extends AppError {
  readonly code = 'idempotency-mismatch';
  readonly status = 409;
  constructor() {
    super('This Idempotency-Key was used for another request. Send a new one.');
  }
}

export class PayloadTooLargeError extends AppError {
  readonly code = 'payload-too-large';
  readonly status = 413;
}

export class UnsupportedMediaTypeError extends AppError {
  readonly code = 'unsupported-media-type';
  readonly status = 415;
}

export class StorageFullError extends AppError {
  readonly code = 'storage-full';
  readonly status = 507;
}

/** Something we depend on is away for the moment; trying again later is the right thing to do. */
export class UnavailableError extends AppError {
  readonly code = 'unavailable';
  readonly status = 503;
  override readonly retryAfterS = 5;
  constructor(options?: { cause?: unknown }) {
    super(
      'The service cannot reach its database right now. Nothing was changed; try again in a few seconds.',
      options,
    );
  }
}

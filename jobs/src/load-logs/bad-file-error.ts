/** The file itself is the trouble: trying again gives the same. The message says what, where, and what mends it. */
export class BadFileError extends Error {
  override readonly name = 'BadFileError';

  constructor(
    readonly code: string,
    message: string,
  ) {
    super(message);
  }
}

/**
 * An error that is the user's to fix: one sentence saying what is wrong, where, and what to do.
 * Anything else that is thrown is a bug and keeps its stack.
 */
export class UserError extends Error {
  override readonly name = 'UserError';
  readonly code: string;
  /** Where: a file, dataset, line, or recipe step. */
  readonly where: string | undefined;
  constructor(code: string, message: string, where?: string) {
    super(message);
    this.code = code;
    this.where = where;
  }
}

/** A run that the user stopped; never shown as a failure. */
export class CancelledError extends Error {
  override readonly name = 'CancelledError';
  constructor() {
    super('stopped by the user');
  }
}

/** What went wrong, as a stable word that callers and tests can branch on. */
export type ErrorCode =
  | 'bad-input'
  | 'bad-plan'
  | 'bad-ledger'
  | 'bad-settings'
  | 'bad-proposal'
  | 'method-cannot'
  | 'numeric'
  | 'out-of-time';

/**
 * An error whose message is written for the person at the terminal: what is wrong, where, and how to mend it,
 * in one line. The command line prints it without a stack trace.
 */
export class OnebatchError extends Error {
  readonly code: ErrorCode;

  constructor(code: ErrorCode, message: string, options?: ErrorOptions) {
    super(message, options);
    this.name = 'OnebatchError';
    this.code = code;
  }
}

/** The closed list of what can go wrong; each has one HTTP status (status.ts). */
export const errorCodes = [
  'invalid',
  'unauthenticated',
  'forbidden',
  'not_found',
  'conflict',
  'limit_exceeded',
  'precondition_failed',
  'precondition_required',
  'unavailable',
  'internal',
] as const;
export type ErrorCode = (typeof errorCodes)[number];

/** One wrong field: where (JSON pointer into the input) and what to do about it. */
export type FieldError = { pointer: string; detail: string };

export type AppErrorOptions = {
  /** Stable name of the case within its code, e.g. `revision-locked`; part of the problem `type`. */
  reason?: string;
  errors?: FieldError[];
  retryAfterS?: number;
  cause?: unknown;
};

/** An error that a person may read: what happened, to what, and what to do. */
export class AppError extends Error {
  override readonly name = 'AppError';
  readonly reason: string;
  readonly errors: FieldError[];
  readonly retryAfterS: number | undefined;

  constructor(
    readonly code: ErrorCode,
    message: string,
    options: AppErrorOptions = {},
  ) {
    super(message, { cause: options.cause });
    this.reason = options.reason ?? code.replaceAll('_', '-');
    this.errors = options.errors ?? [];
    this.retryAfterS = options.retryAfterS;
  }
}

/** A foreign object and a missing one answer alike: this sentence never says which it was. */
export const notFound = (what: string) =>
  new AppError(
    'not_found',
    `There is no such ${what} here. It may have been moved, or the address is not complete.`,
  );
export const forbidden = (detail: string, reason?: string) => new AppError('forbidden', detail, { reason });
export const conflict = (reason: string, detail: string) => new AppError('conflict', detail, { reason });
export const invalid = (detail: string, errors: FieldError[] = []) =>
  new AppError('invalid', detail, { errors });

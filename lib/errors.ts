/**
 * Expected failures. Every one has a stable code that entrances map to a status and
 * screens to words; anything else that is thrown is a defect.
 */
export type ErrorCode =
  | "invalid"
  | "malformed"
  | "too_large"
  | "not_signed_in"
  | "forbidden"
  | "not_found"
  | "conflict"
  | "too_many"
  | "unavailable";

/** One thing wrong with one entry: which field, which row (1-based), what to do. */
export interface Fault {
  readonly field: string;
  readonly message: string;
  readonly row?: number;
}

export class AppError extends Error {
  override readonly name = "AppError";
  constructor(
    readonly code: ErrorCode,
    message: string,
    readonly faults: readonly Fault[] = [],
  ) {
    super(message);
  }
}

/** Input that cannot be accepted; `faults` name each field and its mend. */
export function invalid(message: string, faults: readonly Fault[] = []): AppError {
  return new AppError("invalid", message, faults);
}

export function forbidden(message = "Your role does not allow this."): AppError {
  return new AppError("forbidden", message);
}

export function notFound(what: string): AppError {
  return new AppError("not_found", `${what} was not found. It may have been removed.`);
}

export function conflict(message: string): AppError {
  return new AppError("conflict", message);
}

export function isAppError(error: unknown): error is AppError {
  return error instanceof AppError;
}

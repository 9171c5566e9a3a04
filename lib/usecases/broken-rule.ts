import { AppError } from "@/lib/errors";

/**
 * A rule of the database that an entry broke and that sending it again cannot mend, as an
 * expected error; null for anything else (a lost connection, a deadlock, a defect).
 * SQLSTATE classes: 22 a value out of range, 23 a broken constraint.
 */
export function brokenRule(error: unknown): AppError | null {
  if (!(error instanceof Error) || !("code" in error) || typeof error.code !== "string") {
    return null;
  }
  if (error.code.startsWith("23")) {
    return new AppError("conflict", "What it refers to has changed or is no longer there.");
  }
  return error.code.startsWith("22")
    ? new AppError("invalid", "This entry holds a value that cannot be stored. Enter it again.")
    : null;
}

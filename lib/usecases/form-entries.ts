import { z } from "zod";
import { readScaled } from "@/lib/csv/read-scaled";

interface Limits {
  readonly min?: number;
  readonly max?: number;
  /** What is asked for, in the message: "a voltage such as 3.48". */
  readonly wanted: string;
}

const typed = z.union([z.string(), z.number()]).transform((value) => String(value));

/**
 * A decimal as people type it, "3,48" or "3.48", turned into the integer of a finer unit
 * (`digits` 3: V to mV, mA to uA). Limits are in the finer unit.
 */
export function scaledEntry(digits: number, limits: Limits) {
  return typed.transform((text, context) => {
    const value = readScaled(text, "either", digits);
    if (value !== null && fits(value, limits)) return value;
    context.addIssue({ code: "custom", message: wording(limits, digits) });
    return z.NEVER;
  });
}

/** Like `scaledEntry`; an empty entry is null. */
export function optionalScaledEntry(digits: number, limits: Limits) {
  return z
    .union([z.string(), z.number(), z.null()])
    .optional()
    .transform((value, context) => {
      const text = value === null || value === undefined ? "" : String(value).trim();
      if (text === "") return null;
      const read = readScaled(text, "either", digits);
      if (read !== null && fits(read, limits)) return read;
      context.addIssue({ code: "custom", message: wording(limits, digits) });
      return z.NEVER;
    });
}

function fits(value: number, { min = -Infinity, max = Infinity }: Limits): boolean {
  return value >= min && value <= max;
}

function wording({ min, max, wanted }: Limits, digits: number): string {
  const plain = (value: number) => String(value / 10 ** digits);
  const range =
    min !== undefined && max !== undefined
      ? `, from ${plain(min)} to ${plain(max)}`
      : min !== undefined
        ? `, at least ${plain(min)}`
        : "";
  return `Enter ${wanted}${range}.`;
}

/** Text of one line, trimmed. */
export function textEntry(wanted: string, longest = 200) {
  return z
    .string()
    .trim()
    .min(1, `Enter ${wanted}.`)
    .max(longest, `Keep it within ${longest} characters.`);
}

/** Text that may be left empty; empty stays "". */
export function optionalTextEntry(longest = 2000) {
  return z
    .string()
    .nullish()
    .transform((value) => (value ?? "").trim())
    .pipe(z.string().max(longest, `Keep it within ${longest} characters.`));
}

/** A choice that may be left empty: "" is null. */
export const optionalId = z
  .union([z.uuid("Choose one of the list."), z.literal(""), z.null()])
  .optional()
  .transform((value) => value || null);

export const requiredId = z.uuid("Choose one of the list.");

/** A calendar day that may be left empty. */
export const optionalDay = z
  .union([
    z.string().regex(/^\d{4}-\d{2}-\d{2}$/, "Enter a day as YYYY-MM-DD."),
    z.literal(""),
    z.null(),
  ])
  .optional()
  .transform((value) => value || null);

import { z } from "zod";
import { ROLES } from "./use-case";

/** A mail address as it is stored and compared: trimmed, in lower case. */
export const mailAddress = z
  .string()
  .trim()
  .toLowerCase()
  .max(254, "A mail address has at most 254 characters.")
  .pipe(z.email("Type a mail address such as ada@example.org."));

export const personName = z
  .string()
  .trim()
  .min(1, "Type the person's name.")
  .max(120, "At most 120 characters.");

/** Length is what makes a password hard to guess; no rules on its characters. */
export const newPassword = z
  .string()
  .min(12, "Use at least 12 characters; several words in a row are good.")
  .max(200, "Use at most 200 characters.")
  .refine((text) => new Set(text).size > 4, "Use more than a few different characters.");

export const personRoles = z
  .array(z.enum(ROLES))
  .min(1, "Choose at least one role.")
  .transform((roles) => ROLES.filter((role) => roles.includes(role)));

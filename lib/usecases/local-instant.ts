import { readInstant } from "@/lib/csv/read-instant";
import { invalid } from "@/lib/errors";

/**
 * A moment as a form gives it: local time of the organisation, or an instant with its offset.
 * @throws AppError invalid naming the field
 */
export function localInstant(text: string, timeZone: string, field: string): Date {
  const { at, trouble } = readInstant(text, timeZone, "year-first");
  if (at) return at;
  throw invalid("Some entries need mending.", [{ field, message: `${trouble}.` }]);
}

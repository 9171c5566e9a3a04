import { numberFormatter } from "./formatters";

/** How one organisation writes: passed in everywhere, never read from the machine. */
export interface Presentation {
  /** BCP 47, such as "en-GB" or "de-DE". */
  readonly locale: string;
  /** IANA time zone, such as "Europe/London". */
  readonly timeZone: string;
  /** ISO 4217, such as "GBP". */
  readonly currency: string;
}

/** A space that does not break: between a number and its unit. */
export const NBSP = "\u00a0";
/** The dash of ranges. */
export const EN_DASH = "–";
/** What a table shows for nothing. */
export const NOTHING = "—";

/** A number in the locale's hand, with exactly or at most so many decimals. */
export function formatNumber(value: number, locale: string, decimals = 0, exact = true): string {
  return numberFormatter(locale, {
    minimumFractionDigits: exact ? decimals : 0,
    maximumFractionDigits: decimals,
  }).format(value);
}

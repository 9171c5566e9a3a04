import { z } from "zod";

/** An IANA time zone that this machine knows. */
export const timeZoneEntry = z
  .string()
  .trim()
  .refine(
    (zone) => zone.includes("/") && isKnown(() => Intl.DateTimeFormat("en", { timeZone: zone })),
    {
      message: "Enter an IANA time zone such as Europe/London.",
    },
  );

/** A BCP 47 locale that this machine can write. */
export const localeEntry = z
  .string()
  .trim()
  .refine((locale) => isKnown(() => Intl.getCanonicalLocales(locale)) && canWrite(locale), {
    message: "Enter a locale such as en-GB or de-DE.",
  });

/** An ISO 4217 code. */
export const currencyEntry = z
  .string()
  .trim()
  .toUpperCase()
  .refine((code) => Intl.supportedValuesOf("currency").includes(code), {
    message: "Enter an ISO 4217 code such as GBP or EUR.",
  });

/** Decimal places of a currency's minor unit, from the locale data (ISO 4217). */
export function minorDigits(currency: string): number {
  const options = { style: "currency", currency } as const;
  return new Intl.NumberFormat("en", options).resolvedOptions().maximumFractionDigits ?? 2;
}

const isHttp = (text: string) => URL.canParse(text) && /^https?:$/.test(new URL(text).protocol);

/** The address of a table service; empty is null. */
export const serviceUrlEntry = z
  .string()
  .trim()
  .max(500)
  .refine((text) => text === "" || isHttp(text), "Enter an address such as https://roads.example.")
  .transform((text) => text || null);

/** A tile template with {z}, {x} and {y}; empty is null. */
export const tileUrlEntry = z
  .string()
  .trim()
  .max(500)
  .refine(
    (text) =>
      text === "" ||
      (isHttp(text.replace("{s}.", "")) &&
        ["{z}", "{x}", "{y}"].every((part) => text.includes(part))),
    "Enter an address such as https://tiles.example/{z}/{x}/{y}.png.",
  )
  .transform((text) => text || null);

function isKnown(probe: () => unknown): boolean {
  try {
    probe();
    return true;
  } catch {
    return false;
  }
}

function canWrite(locale: string): boolean {
  return Intl.DateTimeFormat.supportedLocalesOf(locale).length === 1;
}

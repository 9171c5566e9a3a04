import type { Decicelsius, Metres, Microamps, MilliampHours, Millivolts, Minor } from "@/lib/units";
import { EN_DASH, formatNumber, NBSP } from "./locale";
import { numberFormatter } from "./formatters";

/** Volts from millivolts: "3.48 V"; three decimals for cells compared by the millivolt. */
export function formatVolts(millivolts: Millivolts, locale: string, decimals = 2): string {
  return `${formatNumber(millivolts / 1000, locale, decimals)}${NBSP}V`;
}

/** A band of voltages: "3.58–3.64 V". */
export function formatVoltBand(low: Millivolts, high: Millivolts, locale: string): string {
  return `${formatNumber(low / 1000, locale, 2)}${EN_DASH}${formatVolts(high, locale)}`;
}

/** Charge: "235 mAh" below 1 Ah, "2.8 Ah", "18 Ah". At most three significant digits. */
export function formatAh(milliampHours: MilliampHours, locale: string): string {
  if (Math.abs(milliampHours) < 1000) {
    return `${formatNumber(milliampHours, locale, 0)}${NBSP}mAh`;
  }
  const text = numberFormatter(locale, { maximumSignificantDigits: 3 });
  return `${text.format(milliampHours / 1000)}${NBSP}Ah`;
}

/** Current: "42 µA", "1.2 mA", "0.25 A" stays "250 mA". At most three significant digits. */
export function formatCurrent(microamps: Microamps, locale: string): string {
  const text = numberFormatter(locale, { maximumSignificantDigits: 3 });
  if (Math.abs(microamps) < 1000) return `${text.format(microamps)}${NBSP}µA`;
  if (Math.abs(microamps) < 1_000_000) return `${text.format(microamps / 1000)}${NBSP}mA`;
  return `${text.format(microamps / 1_000_000)}${NBSP}A`;
}

/** Temperature from tenths of a degree: "−4.5 °C". */
export function formatTemperature(tenths: Decicelsius, locale: string): string {
  const text = formatNumber(tenths / 10, locale, 1, false);
  return `${text.replace("-", "−")}${NBSP}°C`;
}

/** Distance: "850 m", "3.4 km", "61 km". */
export function formatDistance(metres: Metres, locale: string): string {
  if (metres < 1000) return `${formatNumber(metres, locale)}${NBSP}m`;
  const kilometres = metres / 1000;
  return `${formatNumber(kilometres, locale, kilometres < 10 ? 1 : 0)}${NBSP}km`;
}

export interface MoneyStyle {
  /** Whole units of the currency; a sum that would read as nothing becomes "< £1". */
  whole?: boolean;
  /** What it is per: "wk", "y". */
  per?: string;
}

/**
 * Money from minor units: "£12.40", "£184 / wk", "< £1 / wk". The currency says how many minor
 * units make one (ISO 4217: 100 pence, but 1 yen).
 */
export function formatMoney(
  minor: Minor,
  { locale, currency }: { locale: string; currency: string },
  { whole = false, per }: MoneyStyle = {},
): string {
  const digits =
    numberFormatter(locale, { style: "currency", currency }).resolvedOptions()
      .maximumFractionDigits ?? 2;
  const amount = minor / 10 ** digits;
  const format = numberFormatter(locale, {
    style: "currency",
    currency,
    ...(whole && { maximumFractionDigits: 0 }),
  });
  const tooSmall = whole && amount > 0 && amount < 0.5;
  const text = tooSmall ? `<${NBSP}${format.format(1)}` : format.format(amount);
  return per ? `${text}${NBSP}/${NBSP}${per}` : text;
}

/** A count with its range: "likely 19–28"; "likely 2" where the range is one number. */
export function likelyCount(low: number, high: number, locale: string): string {
  const [a, b] = [formatNumber(low, locale), formatNumber(high, locale)];
  return a === b ? `likely ${a}` : `likely ${a}${EN_DASH}${b}`;
}

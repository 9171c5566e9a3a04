import { formatNumber } from "./locale";

/**
 * A stored integer as a person would type it: 3480 with 3 digits is "3.48" ("3,48"). Without
 * grouping and trailing zeros, so that a form reads back what it shows. Null is "".
 */
export function writtenNumber(value: number | null, digits: number, locale: string): string {
  if (value === null) return "";
  const sign = formatNumber(1.5, locale, 1).includes(",") ? "," : ".";
  const text = (value / 10 ** digits).toFixed(digits);
  const short = digits > 0 ? text.replace(/\.?0+$/, "") : text;
  return short.replace(".", sign);
}

/** An amount as a form shows it, with both decimals: 120 is "1.20". Null is "". */
export function writtenMoney(minor: number | null, locale: string): string {
  if (minor === null) return "";
  const sign = formatNumber(1.5, locale, 1).includes(",") ? "," : ".";
  return (minor / 100).toFixed(2).replace(".", sign);
}

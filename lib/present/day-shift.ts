import { NBSP } from "./locale";

/** How far a date moved, in words: "9 days earlier", "1 day later", "not by a day". */
export function dayShift(days: number): string {
  const whole = Math.round(Math.abs(days));
  if (whole === 0) return "not by a day";
  if (whole >= 730) {
    const years = Math.round(whole / 365.25);
    return `${years}${NBSP}years ${days < 0 ? "earlier" : "later"}`;
  }
  return `${whole}${NBSP}${whole === 1 ? "day" : "days"} ${days < 0 ? "earlier" : "later"}`;
}

/**
 * Units as types. A quantity that is stored or crosses a module border carries its unit
 * in its name (`cutoffMv`) or in its type (`Millivolts`). Base units are integers.
 */
declare const unit: unique symbol;
type Quantity<U extends string> = number & { readonly [unit]?: U };

export type Millivolts = Quantity<"mV">;
export type Microamps = Quantity<"uA">;
export type MilliampHours = Quantity<"mAh">;
export type Milliohms = Quantity<"mOhm">;
export type Seconds = Quantity<"s">;
export type Metres = Quantity<"m">;
/** Minor currency units (pence, cents). */
export type Minor = Quantity<"minor">;
/** Tenths of a degree Celsius, as stored. */
export type Decicelsius = Quantity<"dC">;
/** Days since 1970-01-01T00:00Z, fractional: the time axis of the pure cores. */
export type EpochDays = Quantity<"d">;
/** A calendar day `YYYY-MM-DD` in the organisation's time zone. */
export type IsoDay = string;

export const HOURS_PER_YEAR = 8766;
export const MS_PER_DAY = 86_400_000;

/** Instant to fractional days since the epoch. */
export function toEpochDays(at: Date): EpochDays {
  return at.getTime() / MS_PER_DAY;
}

/** Fractional days since the epoch to an instant, rounded to the millisecond. */
export function fromEpochDays(days: EpochDays): Date {
  return new Date(Math.round(days * MS_PER_DAY));
}

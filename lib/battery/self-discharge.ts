/**
 * Self-discharge as a current of its own. The rate doubles every 10 °C (an activation
 * energy of 51.2 kJ/mol between 20 and 30 °C) and is integrated over the climate, never
 * taken at the mean temperature: half a year at 0 °C and half at 40 °C cost 2.125 times
 * the 20 °C rate.
 */
import type { Decicelsius, EpochDays, Microamps, MilliampHours } from "../units";
import { HOURS_PER_YEAR } from "../units";
import { DAYS_PER_YEAR, MONTH_STARTS, dayOfYear, monthOf, yearOf } from "./climate";

const GAS_CONSTANT = 8.314462618;
const KELVIN = 273.15;

/** Rate relative to 20 °C: 2^((T - 20)/10). */
export function tenDegreeFactor(celsius: number): number {
  return 2 ** ((celsius - 20) / 10);
}

/** Activation energy in J/mol by which a rate doubles between two temperatures in °C. */
export function doublingEnergy(fromCelsius: number, toCelsius: number): number {
  const inverse = 1 / (fromCelsius + KELVIN) - 1 / (toCelsius + KELVIN);
  return (GAS_CONSTANT * Math.LN2) / inverse;
}

/** Temperature in °C that costs as much, held all year, as the given mean factor. */
export function equivalentCelsius(factor: number): number {
  return 20 + 10 * Math.log2(factor);
}

/** Self-discharge at 20 °C as a current through the cell, microamps. */
export function selfDischargeUa(ratedMah: MilliampHours, ppmPerYear: number): Microamps {
  return (ratedMah * 1000 * (ppmPerYear / 1e6)) / HOURS_PER_YEAR;
}

/** The rule summed over a climate: `days(t)` counts days at 20 °C that do the same harm. */
export interface Ageing {
  /** Mean factor over a year. */
  readonly meanFactor: number;
  /** Equivalent days at 20 °C between two moments; negative when `to` is before `from`. */
  between(from: EpochDays, to: EpochDays): number;
}

/** Sites share few climates: each is summed once. */
const AGEINGS = new WeakMap<readonly Decicelsius[], Ageing>();

/** The integral of the ten-degree rule over monthly mean temperatures. */
export function ageing(monthlyMeanDc: readonly Decicelsius[]): Ageing {
  const known = AGEINGS.get(monthlyMeanDc);
  if (known) return known;
  const summed = sumOver(monthlyMeanDc);
  AGEINGS.set(monthlyMeanDc, summed);
  return summed;
}

function sumOver(monthlyMeanDc: readonly Decicelsius[]): Ageing {
  const factors = new Float64Array(12);
  const sums = new Float64Array(13);
  for (let m = 0; m < 12; m++) {
    factors[m] = tenDegreeFactor((monthlyMeanDc[m] ?? 200) / 10);
    sums[m + 1] = sums[m]! + factors[m]! * (MONTH_STARTS[m + 1]! - MONTH_STARTS[m]!);
  }
  const since = (at: EpochDays): number => {
    const month = monthOf(at);
    const inYear = sums[month]! + factors[month]! * (dayOfYear(at) - MONTH_STARTS[month]!);
    return yearOf(at) * sums[12]! + inYear;
  };
  return {
    meanFactor: sums[12]! / DAYS_PER_YEAR,
    between: (from, to) => since(to) - since(from),
  };
}

/** Mean of the rule over a list of temperatures in °C that hold for equal times. */
export function meanFactor(celsius: readonly number[]): number {
  return celsius.reduce((sum, t) => sum + tenDegreeFactor(t), 0) / celsius.length;
}

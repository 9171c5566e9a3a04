import type { Rng } from "./prng";

/** Weather shared by the whole district: a season, weather that persists, and cold snaps. */
export interface Climate {
  readonly meanC: number;
  /** Half the difference between the warmest and the coldest part of the year. */
  readonly amplitudeC: number;
  /** Standard deviation of the daily departures, and how much of one carries to the next day. */
  readonly noiseC: number;
  readonly persistence: number;
  /** Cold snaps a winter (November to March), on average. */
  readonly snapsAWinter: number;
  /** Winters that were colder: by the year in which they begin, in degrees. */
  readonly coldWinters: Readonly<Record<number, number>>;
}

export const FEN_CLIMATE: Climate = {
  meanC: 10.3,
  amplitudeC: 6.8,
  noiseC: 2.6,
  persistence: 0.78,
  snapsAWinter: 2,
  coldWinters: {},
};

export interface Weather {
  /** Mean air temperature of an epoch day, °C. */
  meanC(day: number): number;
  /** Lowest air temperature of an epoch day, °C (just before sunrise). */
  minC(day: number): number;
}

const DAY_MS = 86_400_000;
const WARMEST_DAY_OF_YEAR = 203;

/** 0 at the start of the year, 1 at its end; leap days make no difference worth having. */
export function yearFraction(day: number): number {
  return ((((day + 0.5) / 365.2425) % 1) + 1) % 1;
}

function seasonC(climate: Climate, day: number): number {
  const phase = 2 * Math.PI * (yearFraction(day) - WARMEST_DAY_OF_YEAR / 365.2425);
  return climate.meanC + climate.amplitudeC * Math.cos(phase);
}

/** The year in which the winter holding this day began, or null outside November to March. */
function winterOf(day: number): number | null {
  const date = new Date(day * DAY_MS);
  const month = date.getUTCMonth();
  if (month >= 10) return date.getUTCFullYear();
  return month <= 2 ? date.getUTCFullYear() - 1 : null;
}

/** Daily weather from `firstDay` on, made as far as it is asked for. Source: from memory. */
export function createWeather(rng: Rng, climate: Climate, firstDay: number): Weather {
  const means: number[] = [];
  const swings: number[] = [];
  let departure = 0;
  let snapLeft = 0;
  let snapDepth = 0;
  const innovation = climate.noiseC * Math.sqrt(1 - climate.persistence ** 2);

  function makeNext(): void {
    const day = firstDay + means.length;
    const winter = winterOf(day);
    departure = climate.persistence * departure + rng.normal(0, innovation);
    if (snapLeft > 0) snapLeft -= 1;
    else if (winter !== null && rng.chance(climate.snapsAWinter / 150)) {
      snapLeft = rng.int(4, 11);
      snapDepth = rng.uniform(5, 10);
    }
    const cold = winter === null ? 0 : (climate.coldWinters[winter] ?? 0);
    const mean = seasonC(climate, day) + departure - cold - (snapLeft > 0 ? snapDepth : 0);
    means.push(mean);
    swings.push(Math.max(1.5, rng.normal(4, 1.2)));
  }

  function at(series: number[], day: number): number {
    const index = Math.floor(day) - firstDay;
    if (index < 0)
      throw new RangeError(`weather: day ${day} lies before the first day ${firstDay}`);
    while (means.length <= index) makeNext();
    return series[index] as number;
  }

  return {
    meanC: (day) => at(means, day),
    minC: (day) => at(means, day) - at(swings, day),
  };
}

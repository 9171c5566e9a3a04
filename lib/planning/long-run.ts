/**
 * What a day of service costs in the long run, g: the rate that the best age replacement would
 * reach for packs like this one (age-replacement.ts), because the packs that come after it cannot
 * be swapped at the last moment either. Told as a factor on the cost of a cycle over its
 * expected life, which depends only on how a failure compares with a cycle.
 */
import { normalCdf } from "../stats/normal";
import { bestAge } from "./age-replacement";
import { FUTURE_LIFE_SD } from "./assumptions";

/** Ratios are told apart in steps of this share; a premium moves far less than that. */
const STEP = 0.05;
const known = new Map<number, number>();

/** Log-normal lives of median 1. */
function failedBy(age: number): number {
  return age <= 0 ? 0 : normalCdf(Math.log(age) / FUTURE_LIFE_SD);
}

function premiumOf(ratio: number): number {
  const mean = Math.exp(FUTURE_LIFE_SD ** 2 / 2);
  const longest = Math.exp(6 * FUTURE_LIFE_SD);
  return bestAge(failedBy, { planned: 1, failed: 1 + ratio }, longest).costRate * mean;
}

/**
 * The long-run cost of service over what a cycle costs by its expected life alone, at least 1.
 * @param failureMinor what a failure costs beyond a planned swap
 * @param cycleMinor what a planned cycle costs
 */
export function longRunPremium(failureMinor: number, cycleMinor: number): number {
  if (!(failureMinor > 0) || !(cycleMinor > 0)) return 1;
  const step = Math.round(Math.log(failureMinor / cycleMinor) / STEP);
  const premium = known.get(step) ?? premiumOf(Math.exp(step * STEP));
  known.set(step, premium);
  return premium;
}

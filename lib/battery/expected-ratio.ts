/** What a pack swapped early would have lived, as its readings promised when it came out. */
import { forecastPack } from "./forecast";
import type { FinishedPack } from "./fleet-prior";
import type { ForecastInput } from "./pack";

const Z90 = 1.6448536269514722;

/**
 * ln of the life forecast at `input.now` over the life promised at installation without a
 * fleet prior, and its standard deviation. `input.prior` should be the cohort's.
 */
export function expectedRatio(input: ForecastInput): NonNullable<FinishedPack["expected"]> {
  const from = input.pack.installedAt;
  const plain = { pack: input.pack, readings: [], events: [], prior: null, now: from };
  const promised = Math.max(1, forecastPack(plain).quantiles.p50 - from);
  const { p05, p50, p95 } = forecastPack(input).quantiles;
  const ln = (day: number): number => Math.log(Math.max(1, day - from) / promised);
  return { lnRatio: ln(p50), sd: Math.max(0.01, (ln(p95) - ln(p05)) / (2 * Z90)) };
}

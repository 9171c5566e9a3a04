/** The draw over capacity that a pack's readings tell, as a life still to be lived would need it. */
import { filterPack } from "./filter";
import { rateMarginal } from "./grid";
import type { ForecastInput } from "./pack";

/**
 * Mean and standard deviation of ln(draw over capacity, relative to the sheet's) after all that
 * is known up to `input.now`.
 */
export function expectedLife(input: ForecastInput): { lnPace: number; sd: number } {
  const { grid } = filterPack(input);
  const mass = rateMarginal(grid);
  let total = 0;
  let first = 0;
  let second = 0;
  mass.forEach((m, r) => {
    const ln = grid.lnRate[r]!;
    total += m;
    first += m * ln;
    second += m * ln * ln;
  });
  const lnPace = first / total;
  return { lnPace, sd: Math.max(0.01, Math.sqrt(Math.max(0, second / total - lnPace ** 2))) };
}

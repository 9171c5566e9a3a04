import { seededRng } from "@/lib/routing/rng";
import { afterIterations, solve } from "@/lib/routing/solve";
import type { RoundsSearch } from "./use-case";

/** The search without threads: one go within this process, news once it is over. */
export const searchWithin: RoundsSearch = async ({ problem, turns, options, seed }, onNews) => {
  const { routes, cost } = solve(problem, afterIterations(turns), seededRng(seed), options);
  return (await onNews({ share: 1, cost: cost.total })) === "drop" ? null : routes;
};

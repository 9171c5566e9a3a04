/**
 * The engine: slack-induced ruin and recreate under simulated annealing over technician-days.
 * Pure: time enters through `stop`, chance through `rng`; same seed and iterations, same plan.
 */
import { assertProblem } from "./assert-problem";
import { planCost, missedMust } from "./evaluate";
import { compileModel } from "./model";
import { DEFAULT_PARAMS, type Params } from "./params";
import type { CostParts } from "./price";
import type { Problem, Routes } from "./problem";
import type { Rng } from "./rng";
import { Search } from "./search";

/**
 * How much of the run is over after so many iterations, from 0 to 1 (1 stops). The share also
 * sets the temperature, so it should grow evenly.
 */
export type Stop = (iterations: number) => number;

/** Stops after a number of iterations: the way to a repeatable plan. */
export function afterIterations(count: number): Stop {
  return (iterations) => (count > 0 ? iterations / count : 1);
}

export interface Progress {
  readonly iterations: number;
  readonly share: number;
  /** Cost of the best and of the current plan, penalties of missed must sites included. */
  readonly best: number;
  readonly current: number;
  /** A copy of the best plan, to hand to another search or to keep. */
  readonly elite: () => Routes;
}

/** Called every few iterations; a plan that it returns is taken over if it is better. */
export type OnProgress = (progress: Progress) => Routes | undefined | void;

export interface Options extends Partial<Params> {
  /** A plan to start from. What of it cannot be driven stays out at first. */
  readonly start?: Routes;
}

export interface Solution {
  readonly routes: Routes;
  readonly cost: CostParts;
  /** Sites in no route, and those among them that must be visited. */
  readonly leftOut: readonly number[];
  readonly missedMust: readonly number[];
  readonly iterations: number;
}

/**
 * Plans the rounds: who visits which site on which day, in which order.
 * @throws AppError "invalid" naming each field of a problem that is not whole.
 */
export function solve(
  problem: Problem,
  stop: Stop,
  rng: Rng,
  options: Options = {},
  onProgress?: OnProgress,
): Solution {
  assertProblem(problem);
  const params = { ...DEFAULT_PARAMS, ...options };
  const search = new Search(compileModel(problem), rng, params, options.start);
  let iterations = 0;
  let share = stop(0);
  while (share < 1 && search.canImprove()) {
    search.run(params.stride, share);
    iterations += params.stride;
    share = stop(iterations);
    const given = onProgress?.({
      iterations,
      share,
      best: search.bestTotal,
      current: search.total(),
      elite: () => search.best(),
    });
    if (given) search.take(given);
  }
  search.finish();
  const routes = search.best();
  const visited = new Set(routes.flat());
  return {
    routes,
    cost: planCost(problem, routes),
    leftOut: problem.sites.map((_, s) => s).filter((s) => !visited.has(s)),
    missedMust: missedMust(problem, routes),
    iterations,
  };
}

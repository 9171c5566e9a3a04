/** How long, and how freely, rounds are sought: counted in turns, so that a plan can be repeated. */
import type { Routes } from "../routing/problem";
import type { Options } from "../routing/solve";

/**
 * Turns of a first plan in each thread. Measured on invented fortnights of some 350 visits: 200,000
 * turns in all in place of 48,000 made them 3 to 5 % cheaper. Large plans get fewer, since a turn
 * costs more there.
 */
const MOST_TURNS = 100_000;
const LEAST_TURNS = 32_000;
const TURNS_TIMES_VISITS = 36_000_000;
const TURNS_A_VISIT = 4_000;
/** Rounds that people know are mended, not sought anew: a share of the turns, and of the heat. */
const MENDING_SHARE = 0.25;
const MENDING_HEAT = 0.3;

export interface Effort {
  readonly turns: number;
  readonly options: Options;
}

/**
 * The effort for a plan of so many possible visits.
 * @param known where visits stand already, by slot
 * @param thorough all the turns of a first plan, from the known rounds on
 */
export function effortFor(visits: number, known: Routes, thorough = false): Effort {
  const wanted = Math.max(LEAST_TURNS, Math.min(MOST_TURNS, TURNS_TIMES_VISITS / visits));
  const turns = Math.round(Math.min(wanted, TURNS_A_VISIT * visits));
  if (known.every((route) => route.length === 0)) return { turns, options: {} };
  const options = { start: known, startHeat: MENDING_HEAT };
  return { turns: thorough ? turns : Math.round(turns * MENDING_SHARE), options };
}

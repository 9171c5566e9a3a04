/** The whole way from a fleet to a plan, in steps that a caller may drive by itself. */
import { solve, type OnProgress, type Options, type Stop } from "../routing/solve";
import type { Routes } from "../routing/problem";
import type { Rng } from "../routing/rng";
import { dueSites, type CellsOnHand, type DueSite, type SiteOutlooks } from "./due";
import { effortFor } from "./effort";
import type {
  KnownVisit,
  PlannedTask,
  PlanningFrame,
  PlanningPack,
  PlanningPrices,
  PlanningSite,
  PlanningTechnician,
  TravelTable,
} from "./fleet";
import { addDays } from "./local-time";
import { leftOut, type LeftOut } from "./left-out";
import { outlookContext, outlookOf, tripOf, type OutlookContext } from "./outlook";
import { knownRoutes, roundsProblem, type RoundsProblem } from "./problem";
import { planFigures, roundsOf, type PlanFigures, type PlannedRound } from "./rounds";
import type { RoadAssumption } from "./travel";
import { visitOf, type Visit } from "./visit";

export interface PlanInput {
  readonly frame: PlanningFrame;
  /** Days after the frame's last on which visits may be set down, to be planned later. */
  readonly lookAheadDays?: number;
  readonly prices: PlanningPrices;
  readonly road: RoadAssumption;
  readonly technicians: readonly PlanningTechnician[];
  readonly sites: readonly PlanningSite[];
  readonly packs: readonly PlanningPack[];
  readonly cellsOnHand: CellsOnHand;
  /** Visits that stand in the plan being changed or in rounds that people know. */
  readonly known: readonly KnownVisit[];
  /** Assets that the dispatcher took out by hand. */
  readonly excludedAssets: ReadonlySet<string>;
}

export interface PreparedPlan {
  readonly input: PlanInput;
  /** The frame with the days that are only looked at. */
  readonly horizon: PlanningFrame;
  readonly context: OutlookContext;
  readonly outlooks: readonly SiteOutlooks[];
  readonly due: readonly DueSite[];
  readonly visits: readonly Visit[];
  /** Cells that the visits share; null: nothing is held against stores. */
  readonly stock: CellsOnHand | null;
}

/** Outlooks of every pack, by site. */
export function siteOutlooks(
  sites: readonly PlanningSite[],
  packs: readonly PlanningPack[],
  context: OutlookContext,
): SiteOutlooks[] {
  const bySite = new Map<string, PlanningPack[]>();
  for (const pack of packs) bySite.set(pack.siteId, [...(bySite.get(pack.siteId) ?? []), pack]);
  return sites.map((site) => ({
    site,
    outlooks: (bySite.get(site.siteId) ?? []).map((pack) => outlookOf(pack, site, context)),
    tripShareMinor: tripOf(site, context).shareMinor,
  }));
}

function mergedTasks(known: KnownVisit | undefined, due: DueSite | undefined): PlannedTask[] {
  const kept = known?.tasks ?? [];
  const assets = new Set(kept.map((task) => task.assetId));
  return [...kept, ...(due?.tasks ?? []).filter((task) => !assets.has(task.assetId))];
}

/** Prices waiting for every pack and decides which visits the plan may make. */
export function preparePlan(input: PlanInput): PreparedPlan {
  const { frame, prices, road } = input;
  const horizon = { ...frame, lastDay: addDays(frame.lastDay, input.lookAheadDays ?? 0) };
  const depots = input.technicians.map((technician) => technician.depot);
  const context = outlookContext(horizon, prices, depots, road, frame.lastDay);
  const outlooks = siteOutlooks(input.sites, input.packs, context);
  const wanted = outlooks.map((site) => ({
    ...site,
    outlooks: site.outlooks.filter((o) => !input.excludedAssets.has(o.pack.assetId)),
  }));
  const due = dueSites(wanted, input.cellsOnHand, context);
  const dueBySite = new Map(due.map((d) => [d.site.siteId, d]));
  const knownBySite = new Map(input.known.map((k) => [k.siteId, k]));
  const visits = outlooks.flatMap(({ site, outlooks: all }) => {
    const tasks = mergedTasks(knownBySite.get(site.siteId), dueBySite.get(site.siteId));
    return tasks.length > 0 ? [visitOf(site, tasks, all, context)] : [];
  });
  return { input, horizon, context, outlooks, due, visits, stock: input.cellsOnHand };
}

/** The visits that stand already, and `extra` ones, with nothing else: enough to price edits. */
export function prepareKnown(
  input: PlanInput,
  extra: readonly { readonly siteId: string; readonly tasks: readonly PlannedTask[] }[],
): PreparedPlan {
  const depots = input.technicians.map((technician) => technician.depot);
  const context = outlookContext(input.frame, input.prices, depots, input.road);
  const outlooks = siteOutlooks(input.sites, input.packs, context);
  const tasksOf = new Map([...input.known, ...extra].map((v) => [v.siteId, v.tasks]));
  const visits = outlooks.flatMap(({ site, outlooks: all }) => {
    const tasks = tasksOf.get(site.siteId);
    return tasks ? [visitOf(site, tasks, all, context)] : [];
  });
  const horizon = input.frame;
  return { input, horizon, context, outlooks, due: [], visits, stock: null };
}

/** The routing problem of a prepared plan; `travel` covers its technicians' depots and visits. */
export function problemOf(prepared: PreparedPlan, travel: TravelTable): RoundsProblem {
  const { prices, technicians, known } = prepared.input;
  const { horizon: frame, visits, stock } = prepared;
  return roundsProblem({ frame, prices, technicians, known, travel, visits, stock });
}

export interface FinishedPlan {
  readonly rounds: readonly PlannedRound[];
  readonly figures: PlanFigures;
  readonly leftOut: readonly LeftOut[];
  readonly routes: Routes;
}

/** Rounds, figures and what is left out, from the routes of a prepared plan. */
export function finishPlan(
  prepared: PreparedPlan,
  problem: RoundsProblem,
  routes: Routes,
): FinishedPlan {
  const { frame, excludedAssets } = prepared.input;
  const own = routes.map((route, r) => (problem.slots[r]!.day <= frame.lastDay ? route : []));
  return {
    rounds: roundsOf(problem, own),
    figures: planFigures(problem, own),
    leftOut: leftOut(problem, routes, frame.lastDay, prepared.due, excludedAssets),
    routes: own,
  };
}

export interface Search {
  readonly stop: Stop;
  readonly rng: Rng;
  readonly options?: Options;
  readonly onProgress?: OnProgress;
}

/** Plans the rounds. Same input, seed and iterations: same plan. */
export function makePlan(
  prepared: PreparedPlan,
  travel: TravelTable,
  search: Search,
): FinishedPlan {
  const problem = problemOf(prepared, travel);
  const known = knownRoutes(problem, prepared.input.known);
  const options = { ...effortFor(prepared.visits.length, known).options, ...search.options };
  const { routes } = solve(problem.problem, search.stop, search.rng, options, search.onProgress);
  return finishPlan(prepared, problem, routes);
}

import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import { loadLeftOut } from "@/db/queries/plan-left-out";
import { loadPlanRounds, type StoredRound } from "@/db/queries/plan-rounds";
import { findPlan, type PlanRow } from "@/db/queries/plans";
import { conflict, notFound } from "@/lib/errors";
import type { PlannedTask } from "@/lib/planning/fleet";
import { prepareKnown, problemOf, type PreparedPlan } from "@/lib/planning/plan";
import { knownRoutes, placesOf, type RoundsProblem } from "@/lib/planning/problem";
import type { Routes } from "@/lib/routing/problem";
import { knownVisits, loadWorld, type PlanningWorld } from "./planning-world";
import { travelTimes, type TravelSource } from "./travel-times";
import type { Deps } from "./use-case";

/** A plan with all that is needed to price an act on it. */
export interface OpenPlan {
  readonly plan: PlanRow;
  readonly rounds: readonly StoredRound[];
  readonly world: PlanningWorld;
  readonly prepared: PreparedPlan;
  readonly problem: RoundsProblem;
  readonly routes: Routes;
  readonly travel: TravelSource;
}

/** Work that an act would bring into the plan. */
export interface ExtraVisit {
  readonly siteId: string;
  readonly tasks: readonly PlannedTask[];
}

/** @throws AppError not_found */
export async function getPlan(db: Kysely<Database>, planId: string): Promise<PlanRow> {
  const plan = await findPlan(db, planId);
  if (!plan || plan.state === "discarded") throw notFound("This plan");
  return plan;
}

/** @throws AppError conflict unless the plan is a draft of this version */
export function assertDraft(plan: PlanRow, version?: number): void {
  if (plan.state === "building") {
    throw conflict("This plan is still being built. Wait for it, or discard it.");
  }
  if (plan.state !== "draft") {
    throw conflict("This plan is published already. Change its rounds in a new draft.");
  }
  if (version !== undefined && version !== plan.version) {
    throw conflict(
      "Somebody changed this plan in the meantime. It is shown as it is now; please repeat your last act.",
    );
  }
}

/** Assets that were taken out by hand. */
export async function excludedAssets(db: Kysely<Database>, planId: string): Promise<Set<string>> {
  const rows = await loadLeftOut(db, planId);
  return new Set(rows.filter((row) => row.reason === "excluded").map((row) => row.assetId));
}

export interface OpenOptions {
  readonly extra?: readonly ExtraVisit[];
  /**
   * Rounds that an act can touch. The others are left out of the problem as if they were empty:
   * prices of acts are differences of the touched rounds, so they stay the same and come at once.
   */
  readonly concerns?: (round: StoredRound) => boolean;
}

/** Opens a plan: its rounds as routes of a problem that holds its visits and the extra ones. */
export async function openPlan(
  deps: Deps,
  db: Kysely<Database>,
  plan: PlanRow,
  { extra = [], concerns = () => true }: OpenOptions = {},
): Promise<OpenPlan> {
  const rounds = await loadPlanRounds(db, plan.id);
  const open = rounds.filter(
    (round) => (round.state === "proposed" || round.state === "published") && concerns(round),
  );
  const known = knownVisits(open);
  const siteIds = [...new Set([...known, ...extra].map((visit) => visit.siteId))];
  const world = await loadWorld(db, deps.now(), plan, {
    siteIds,
    known,
    excludedAssets: new Set(),
  });
  const prepared = prepareKnown(world.input, extra);
  const places = placesOf(world.input.technicians, prepared.visits);
  const travel = await travelTimes(deps, world.organisation, places);
  const problem = problemOf(prepared, travel.table);
  return {
    plan,
    rounds: open,
    world,
    prepared,
    problem,
    routes: knownRoutes(problem, known),
    travel: travel.source,
  };
}

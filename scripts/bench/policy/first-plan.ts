/** The first plan of one week that a newcomer gets on the demonstration, and why packs are in it. */
import { habitCost } from "@/lib/planning/habit";
import type { PackOutlook } from "@/lib/planning/outlook";
import { finishPlan, preparePlan, problemOf } from "@/lib/planning/plan";
import { placesOf } from "@/lib/planning/problem";
import { greatCircleTable } from "@/lib/planning/travel";
import { seededRng } from "@/lib/routing/rng";
import { afterIterations, solve } from "@/lib/routing/solve";
import { groupBy } from "@/lib/usecases/forecast-input";
import { median } from "../timing";
import { BEFORE_WORK } from "./field";
import { assetOf, type Fleet, ROAD } from "./fleet";
import { ForecastDesk } from "./forecasts";
import { weekInput } from "./rounds";
import { demonstration } from "./start";
import { planningPacks } from "./wanewright";

/** As run-plan-job has them. */
const TURNS = 48_000;
const SEED = 20_261_201;

function whyLine(fleet: Fleet, now: number, kind: string, own: readonly PackOutlook[]): string {
  const due = own.filter((o) => o.standing === "due");
  const near = own.filter((o) => o.standing === "near");
  const of = (value: (o: PackOutlook) => number) => median(due.map(value));
  const days = (p: number) => of((o) => o.pack.life[p]! - now).toFixed(0);
  const cells = [
    kind,
    `${own.length}`,
    `${due.length}`,
    `${near.length}`,
    of((o) => o.visits[6]!.chanceOut).toFixed(3),
    of((o) => o.pack.shareLeft).toFixed(2),
    `${days(2)} / ${days(25)} / ${days(47)}`,
  ];
  return `| ${cells.join(" | ")} |`;
}

/** Swaps, cost and habit of the first plan, and the due packs by device model and cell type. */
export function firstPlanReport(): string {
  const { fleet, firstDay, open } = demonstration();
  const field = open();
  field.beginDay(firstDay);
  const now = firstDay + BEFORE_WORK;
  const packs = planningPacks(field, new ForecastDesk(field), now);
  const prepared = preparePlan(weekInput(field, firstDay, packs));
  const places = placesOf(prepared.input.technicians, prepared.visits);
  const problem = problemOf(prepared, greatCircleTable(places, ROAD));
  const { routes } = solve(problem.problem, afterIterations(TURNS), seededRng(SEED));
  const { figures, rounds } = finishPlan(prepared, problem, routes);
  const habit = habitCost(prepared.outlooks, prepared.context);
  const swaps = rounds
    .flatMap((r) => r.stops.flatMap((s) => s.tasks))
    .filter((t) => t.kind === "swap");
  const withHabit = swaps.filter((t) => assetOf(fleet, t.assetId).model.habitIntervalDays !== null);
  const outlooks = prepared.outlooks.flatMap((site) => site.outlooks);
  const kinds = groupBy(outlooks, ({ pack }) => {
    const { model, designation } = assetOf(fleet, pack.assetId);
    return `${model.code} ${designation}`;
  });
  return [
    `${packs.length} packs; plan: ${figures.swaps} swaps at ${figures.sites} sites in ${figures.rounds} rounds,`,
    `£${(figures.totalMinor / 100).toFixed(0)}; ${withHabit.length} of the swaps on packs that have a habit.`,
    `Habit: £${(habit.minorPerWeek / 100).toFixed(0)} a week for ${habit.packs} packs.`,
    "",
    "| kind | packs | due | near | chance out in the week | share left | days left p05 / p50 / p95 |",
    "| --- | --- | --- | --- | --- | --- | --- |",
    ...[...kinds].map(([kind, own]) => whyLine(fleet, now, kind, own)),
  ].join("\n");
}

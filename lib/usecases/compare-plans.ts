import { z } from "zod";
import { getOrganisation, type Organisation } from "@/db/queries/organisation";
import { loadPlanRounds, type StoredRound } from "@/db/queries/plan-rounds";
import type { PlanRow } from "@/db/queries/plans";
import { loadTechniciansToPlan } from "@/db/queries/planning-fleet";
import { loadSiteNames } from "@/db/queries/sites";
import { type PlacedVisit, planDifference } from "@/lib/planning/plan-difference";
import { formatDay } from "@/lib/present/format-day";
import { differenceWords } from "@/lib/present/plan-difference-words";
import { comparedFigures } from "@/lib/present/plan-figures";
import { getPlan } from "./open-plan";
import { storedCost } from "./plan-cost";
import { defineUseCase } from "./use-case";

/** Two plans side by side: what each costs and risks, and whose days differ. */
export const comparePlans = defineUseCase({
  name: "compare-plans",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ planId: z.uuid(), otherId: z.uuid() }),
  async run(deps, _actor, { planId, otherId }) {
    const organisation = await getOrganisation(deps.db);
    const [plan, other] = [await getPlan(deps.db, planId), await getPlan(deps.db, otherId)];
    const rounds = await loadPlanRounds(deps.db, plan.id);
    const others = await loadPlanRounds(deps.db, other.id);
    const difference = planDifference(visitsOf(rounds), visitsOf(others));
    const technicians = await loadTechniciansToPlan(deps.db, []);
    const names = new Map(technicians.map((t) => [t.id, t.name]));
    const sites = await loadSiteNames(deps.db, [
      ...new Set([...rounds, ...others].flatMap((round) => round.stops.map((s) => s.siteId))),
    ]);
    const place = (visit: PlacedVisit) =>
      `${formatDay(visit.day, organisation.locale, { weekday: true, today: visit.day })}, ${names.get(visit.technicianId) ?? "nobody"}`;
    const site = (id: string) => sites.get(id) ?? "a site";
    return {
      plans: [headOf(plan, organisation), headOf(other, organisation)] as const,
      figures: figuresOf(plan, other, organisation),
      words: differenceWords(difference, organisation.locale),
      changes: [
        ...difference.moved.map((m) => ({
          siteId: m.siteId,
          site: site(m.siteId),
          before: place(m.from),
          after: place(m.to),
        })),
        ...difference.added.map((v) => ({
          ...{ siteId: v.siteId, site: site(v.siteId), before: null, after: place(v) },
        })),
        ...difference.dropped.map((v) => ({
          ...{ siteId: v.siteId, site: site(v.siteId), before: place(v), after: null },
        })),
      ],
    };
  },
});

export type PlanComparison = Awaited<ReturnType<typeof comparePlans>>;

/** Where every visit of some rounds stands. */
export function visitsOf(rounds: readonly StoredRound[]): PlacedVisit[] {
  return rounds.flatMap(({ technicianId, day, stops }) =>
    stops.map(({ siteId }) => ({ siteId, technicianId, day })),
  );
}

function headOf({ id, name, state, firstDay, createdAt }: PlanRow, { locale }: Organisation) {
  return { id, name, state, firstDay, from: formatDay(firstDay, locale), createdAt };
}

function figuresOf(plan: PlanRow, other: PlanRow, organisation: Organisation) {
  const [a, b] = [storedCost(plan.cost), storedCost(other.cost)];
  return a && b ? comparedFigures(a.figures, b.figures, organisation) : [];
}

import { listReordered } from "@/db/queries/stop-order";
import { countOpenMatters } from "@/db/queries/field-matters";
import { z } from "zod";
import { getOrganisation, type Organisation } from "@/db/queries/organisation";
import { lastPlanStep } from "@/db/queries/plan-steps";
import { loadTechniciansToPlan } from "@/db/queries/planning-fleet";
import { findPlan, type PlanRow, plansWithin } from "@/db/queries/plans";
import { findRound } from "@/db/queries/plan-rounds";
import { loadLeftOutAssets } from "@/db/queries/plan-left-out";
import { addDays, daysFrom, localDay, mondayOf, weekdayOf } from "@/lib/planning/local-time";
import { formatDay } from "@/lib/present/format-day";
import { weekLabel } from "@/lib/present/format-week";
import { formatMoney } from "@/lib/present/format-quantity";
import { formatHours } from "@/lib/present/format-time";
import { leftOutWords } from "@/lib/present/left-out-words";
import { type BoardRound, boardRound, packDisc } from "@/lib/present/rounds-board";
import { planFigureWords } from "@/lib/present/plan-figures";
import { storedCost } from "./plan-cost";
import { storedProgress } from "./plan-progress";
import { boardInputs, roundsShown, shiftS } from "./rounds-of-week";
import { type Deps, defineUseCase } from "./use-case";

/** The Rounds screen: technicians by days, with the draft where there is one. */
export const readRoundsBoard = defineUseCase({
  name: "read-rounds-board",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({
    /** Any day of the week; without it next week's draft, else this week. */
    week: z.iso.date().nullable().catch(null),
    planId: z.uuid().nullable().catch(null),
    roundId: z.uuid().nullable().catch(null),
    crewId: z.uuid().nullable().catch(null),
  }),
  async run(deps, actor, input) {
    const organisation = await getOrganisation(deps.db);
    const today = localDay(deps.now(), organisation.timeZone);
    const { monday, plan, plans } = await whichWeek(deps, input, today);
    const all = await loadTechniciansToPlan(deps.db, []);
    const technicians = all.filter((t) => input.crewId === null || t.crewId === input.crewId);
    const week = { firstDay: monday, lastDay: addDays(monday, 6) };
    const drafts = plan && plan.state !== "published" ? [plan] : [];
    const stored = await roundsShown(deps.db, technicians, week, drafts);
    const rounds = (await boardInputs(deps.db, technicians, stored)).map((round) =>
      boardRound(round, today, organisation),
    );
    const days = daysFrom(week.firstDay, week.lastDay).filter(
      (day) =>
        organisation.workingDays.includes(weekdayOf(day)) || rounds.some((r) => r.day === day),
    );
    const cost = plan ? storedCost(plan.cost) : null;
    return {
      today,
      monday,
      weekLabel: weekLabel(monday, today),
      mayEdit: actor.kind === "person" && actor.roles.some((r) => DISPATCHERS.includes(r)),
      plan: plan && (await planShown(deps, plan, stored)),
      plans: plans.map(({ id, name, state }) => ({ id, name, state })),
      crews: [...new Map(all.map((t) => [t.crewId, { id: t.crewId, name: t.crewName }])).values()],
      figures: cost ? planFigureWords(cost, organisation) : [],
      days: days.map((day) => ({
        day,
        label: formatDay(day, organisation.locale, { weekday: true, today }),
        isToday: day === today,
      })),
      rows: technicians.map((technician) => boardRow(technician, days, organisation.locale)),
      rounds,
      ...(await fromField(deps, stored)),
      leftOut: plan ? await leftOutShown(deps, plan.id, today, organisation) : [],
    };
  },
});
export type RoundsBoard = Awaited<ReturnType<typeof readRoundsBoard>>;
export type { BoardRound };

const DISPATCHERS: readonly string[] = ["administrator", "dispatcher"];

type TechnicianRow = Awaited<ReturnType<typeof loadTechniciansToPlan>>[number];

/** What the phones have said: matters to decide, rounds in their technician's own order. */
async function fromField(deps: Deps, shown: readonly { readonly id: string }[]) {
  const ids = shown.map((round) => round.id);
  const [matters, reordered] = await Promise.all([
    countOpenMatters(deps.db),
    listReordered(deps.db, ids),
  ]);
  return { matters, reordered };
}

/** The plan itself: its state, its version, what can be undone. */
async function planShown(deps: Deps, plan: PlanRow, shown: readonly { planId: string }[]) {
  const step = await lastPlanStep(deps.db, plan.id);
  const { id, name, state, version, firstDay, lastDay, problem } = plan;
  return {
    ...{ id, name, state, version, firstDay, lastDay, problem },
    progress: state === "building" ? storedProgress(plan.progress) : null,
    stopping: plan.stopAskedAt !== null,
    undo: step?.words ?? null,
    roundCount: shown.filter((round) => round.planId === id).length,
    travelTrouble: storedCost(plan.cost)?.travel.trouble ?? null,
  };
}

function boardRow(technician: TechnicianRow, days: readonly string[], locale: string) {
  const off = days.flatMap((day) => {
    const why = whyOff(technician, day);
    return why === null ? [] : [[day, why] as const];
  });
  return {
    technicianId: technician.id,
    name: technician.name,
    crew: technician.crewName,
    facts: factsOf(technician, days, locale),
    off: Object.fromEntries(off) as Record<string, string>,
  };
}

async function leftOutShown(deps: Deps, planId: string, today: string, organisation: Organisation) {
  const rows = await loadLeftOutAssets(deps.db, planId);
  return rows.map((row) => ({
    assetId: row.assetId,
    siteId: row.siteId,
    tag: row.tag,
    name: row.assetName,
    reason: row.reason,
    why: leftOutWords(row, today, organisation.locale),
    waiting: formatMoney(row.waitingCostMinorPerWeek, organisation, { whole: true, per: "wk" }),
    latitude: row.latitude,
    longitude: row.longitude,
    disc: packDisc(row, today, organisation),
  }));
}

/** The week and the plan to show, from whatever the address names. */
async function whichWeek(
  deps: Deps,
  input: { week: string | null; planId: string | null; roundId: string | null },
  today: string,
): Promise<{ monday: string; plan: PlanRow | null; plans: PlanRow[] }> {
  const round = input.roundId ? await findRound(deps.db, input.roundId) : null;
  const named = input.planId ?? (round?.state === "proposed" ? round.planId : null);
  const asked = named ? await findPlan(deps.db, named) : null;
  const plan = asked?.state === "discarded" ? null : asked;
  const monday = mondayOf(input.week ?? round?.day ?? plan?.firstDay ?? today);
  const plans = await plansWithin(deps.db, monday, addDays(monday, 6));
  const open = plans.find((p) => p.state === "draft" || p.state === "building");
  return { monday, plan: plan ?? open ?? plans[0] ?? null, plans };
}

function factsOf(technician: TechnicianRow, days: readonly string[], locale: string): string {
  const longest = Math.max(0, ...days.map((day) => shiftS(technician, day)));
  const van = technician.vanName ?? "";
  return [van, longest > 0 ? formatHours(longest, locale) : "", ...technician.tickets.map(ticket)]
    .filter(Boolean)
    .join(" · ");
}

function ticket(name: string): string {
  return name.replaceAll("_", " ");
}

function whyOff(technician: TechnicianRow, day: string): string | null {
  const away = technician.absences.find((a) => a.firstDay <= day && day <= a.lastDay);
  if (away) return away.reason || "away";
  return technician.shifts.some((s) => s.weekday === weekdayOf(day)) ? null : "not working";
}

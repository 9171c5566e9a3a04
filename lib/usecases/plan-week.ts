import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { getOrganisation } from "@/db/queries/organisation";
import { loadTechniciansToPlan } from "@/db/queries/planning-fleet";
import { insertPlan } from "@/db/queries/plans";
import { invalid } from "@/lib/errors";
import { addDays, localDay, mondayOf } from "@/lib/planning/local-time";
import { isoWeek } from "@/lib/present/format-week";
import { type Deps, defineUseCase, personIdOf } from "./use-case";

/**
 * Starts the build of a plan for one or more weeks. The draft shows at once and fills while the
 * worker builds it; rounds already published in those weeks are where the build starts from.
 */
export const planWeek = defineUseCase({
  name: "plan-week",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({
    /** Any day of the first week. */
    week: z.iso.date({ error: "Choose a week." }),
    weeks: z.coerce.number().int().min(1).max(4).default(1),
    /** Empty: every crew. */
    crewIds: z.array(z.uuid()).default([]),
  }),
  async run(deps, actor, { week, weeks, crewIds }) {
    const { firstDay, lastDay } = await coverOf(deps, week, weeks, crewIds);
    const planId = deps.newId();
    const name = weekName(firstDay, lastDay);
    await deps.db.transaction().execute(async (trx) => {
      await insertPlan(trx, {
        id: planId,
        name,
        firstDay,
        lastDay,
        crewIds,
        state: "building",
        createdBy: personIdOf(actor),
        createdAt: deps.now(),
      });
      await deps.jobs.enqueue(trx, "plan", { planId, mode: "build" });
      await appendAudit(trx, {
        at: deps.now(),
        personId: personIdOf(actor),
        act: "plan-week",
        subjectKind: "plan",
        subjectId: planId,
        detail: { firstDay, lastDay, crewIds },
      });
    });
    return { planId };
  },
});

/** @throws AppError invalid when the weeks are over or nobody can be sent out */
async function coverOf(deps: Deps, week: string, weeks: number, crewIds: readonly string[]) {
  const organisation = await getOrganisation(deps.db);
  const today = localDay(deps.now(), organisation.timeZone);
  const monday = mondayOf(week);
  const lastDay = addDays(monday, weeks * 7 - 1);
  if (lastDay < today) {
    throw invalid("This week is over.", [
      { field: "week", message: "Choose this week or a later one." },
    ]);
  }
  const technicians = await loadTechniciansToPlan(deps.db, crewIds);
  if (technicians.length === 0) {
    throw invalid("There is nobody to send out.", [
      { field: "crewIds", message: "Choose a crew with technicians, or add them in Settings." },
    ]);
  }
  return { firstDay: monday < today ? today : monday, lastDay };
}

/** "Week 50", "Weeks 50–51". */
export function weekName(firstDay: string, lastDay: string): string {
  const [first, last] = [isoWeek(firstDay).week, isoWeek(lastDay).week];
  return first === last ? `Week ${first}` : `Weeks ${first}–${last}`;
}

import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { insertAbsence } from "@/db/queries/absences";
import { loadBindingRounds } from "@/db/queries/plan-rounds";
import { insertPlan } from "@/db/queries/plans";
import { conflict, invalid, notFound } from "@/lib/errors";
import { addDays, localDay, mondayOf } from "@/lib/planning/local-time";
import { getOrganisation } from "@/db/queries/organisation";
import { weekName } from "./plan-week";
import { type Actor, type Deps, defineUseCase, personIdOf } from "./use-case";

/**
 * Notes that a technician is away, from today's call in sick to next month's holiday. Where that
 * leaves published rounds without a driver, a draft is made in which the others take over what
 * they can, with their own days kept; nothing is sent before it is published.
 */
export const markAbsent = defineUseCase({
  name: "mark-absent",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({
    technicianId: z.uuid(),
    firstDay: z.iso.date({ error: "Choose the first day." }),
    lastDay: z.iso.date({ error: "Choose the last day." }),
    reason: z.string().trim().max(120).default(""),
  }),
  async run(deps, actor, input) {
    if (input.lastDay < input.firstDay) {
      throw invalid("The absence ends before it begins.", [
        { field: "lastDay", message: "Choose the first day or a later one." },
      ]);
    }
    const affected = await loadBindingRounds(
      deps.db,
      [input.technicianId],
      input.firstDay,
      input.lastDay,
    );
    const open = affected.filter((round) => round.state === "published").map((r) => r.day);
    const planId = await deps.db.transaction().execute(async (trx) => {
      const outcome = await insertAbsence(trx, { id: deps.newId(), ...input });
      if (outcome === "unknown") throw notFound("This technician");
      if (outcome === "overlaps") {
        throw conflict("There is an absence on some of these days already.");
      }
      await appendAudit(trx, {
        at: deps.now(),
        personId: personIdOf(actor),
        act: "mark-absent",
        subjectKind: "technician",
        subjectId: input.technicianId,
        detail: { ...input, roundsLeftOpen: open.length },
      });
      return open.length > 0 ? repairDraft(deps, trx, actor, open) : null;
    });
    return { roundsLeftOpen: open.length, planId };
  },
});

/** A draft over the weeks whose rounds lost their driver, built by the worker. */
async function repairDraft(
  deps: Deps,
  trx: Parameters<typeof insertPlan>[0],
  actor: Actor,
  days: readonly string[],
): Promise<string> {
  const { timeZone } = await getOrganisation(trx);
  const today = localDay(deps.now(), timeZone);
  const sorted = [...days].sort();
  const monday = mondayOf(sorted[0]!);
  const firstDay = monday < today ? today : monday;
  const lastDay = addDays(mondayOf(sorted.at(-1)!), 6);
  const planId = deps.newId();
  await insertPlan(trx, {
    id: planId,
    name: `${weekName(firstDay, lastDay)}, repaired`,
    firstDay,
    lastDay,
    crewIds: [],
    state: "building",
    createdBy: personIdOf(actor),
    createdAt: deps.now(),
  });
  await deps.jobs.enqueue(trx, "plan", { planId, mode: "repair" });
  return planId;
}

import { z } from "zod";
import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { appendAudit } from "@/db/queries/audit";
import { getOrganisation } from "@/db/queries/organisation";
import { loadBindingRounds, replaceRounds } from "@/db/queries/plan-rounds";
import { loadTechniciansToPlan } from "@/db/queries/planning-fleet";
import { changePlan, insertPlan, lockPlan, plansWithin } from "@/db/queries/plans";
import { conflict } from "@/lib/errors";
import { addDays, localDay, mondayOf } from "@/lib/planning/local-time";
import { openPlan } from "./open-plan";
import { planCostOf } from "./plan-cost";
import { isCovered, type PlanCover } from "./planning-world";
import { weekName } from "./plan-week";
import { copyRounds } from "./stored-rounds";
import { type Actor, type Deps, defineUseCase, personIdOf } from "./use-case";

/**
 * A draft in which the published rounds of a week can be changed. Nothing changes for anybody
 * until it is published. An open draft of the week is taken up again instead of a second one.
 */
export const revisePlan = defineUseCase({
  name: "revise-plan",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({ day: z.iso.date() }),
  async run(deps, actor, { day }) {
    const organisation = await getOrganisation(deps.db);
    const today = localDay(deps.now(), organisation.timeZone);
    const monday = mondayOf(day);
    const cover = {
      firstDay: monday < today ? today : monday,
      lastDay: addDays(monday, 6),
      crewIds: [],
    };
    if (cover.lastDay < today) throw conflict("This week is over; its rounds stay as they were.");
    return deps.db.transaction().execute(async (trx) => {
      const open = await plansWithin(trx, cover.firstDay, cover.lastDay);
      const draft = open.find((p) => p.state === "draft" && p.crewIds.length === 0);
      if (draft) return { planId: draft.id, version: draft.version, made: false };
      const { planId, version } = await openDraft(deps, trx, actor, cover);
      await appendAudit(trx, {
        at: deps.now(),
        personId: personIdOf(actor),
        act: "revise-plan",
        subjectKind: "plan",
        subjectId: planId,
        detail: cover,
      });
      return { planId, version, made: true };
    });
  },
});

async function openDraft(
  deps: Deps,
  trx: Transaction<Database>,
  actor: Actor,
  cover: PlanCover,
): Promise<{ planId: string; version: number }> {
  const technicians = await loadTechniciansToPlan(trx, cover.crewIds);
  const ids = new Set(technicians.map((technician) => technician.id));
  const binding = await loadBindingRounds(trx, [...ids], cover.firstDay, cover.lastDay);
  const planId = deps.newId();
  await insertPlan(trx, {
    id: planId,
    name: `${weekName(cover.firstDay, cover.lastDay)}, changed`,
    ...cover,
    state: "draft",
    createdBy: personIdOf(actor),
    createdAt: deps.now(),
  });
  const covered = binding.filter((round) => isCovered(round, cover, ids));
  await replaceRounds(trx, planId, copyRounds(planId, covered, deps.newId));
  const opened = await openPlan(deps, trx, (await lockPlan(trx, planId))!);
  const cost = planCostOf(null, opened, opened.routes);
  return { planId, version: await changePlan(trx, planId, { cost }) };
}

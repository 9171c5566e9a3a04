import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { type LeftOutRow, replaceLeftOut } from "@/db/queries/plan-left-out";
import { replaceRounds, type StoredRound } from "@/db/queries/plan-rounds";
import { deletePlanStep, lastPlanStep } from "@/db/queries/plan-steps";
import { changePlan, lockPlan } from "@/db/queries/plans";
import { conflict, notFound } from "@/lib/errors";
import { assertDraft } from "./open-plan";
import { defineUseCase, personIdOf } from "./use-case";

interface Kept {
  readonly rounds: readonly (Omit<StoredRound, "startsAt" | "endsAt" | "stops"> & {
    readonly startsAt: string;
    readonly endsAt: string;
    readonly stops: readonly (Omit<StoredRound["stops"][number], "arrivesAt" | "departsAt"> & {
      readonly arrivesAt: string;
      readonly departsAt: string;
    })[];
  })[];
  readonly leftOut: readonly LeftOutRow[];
  readonly cost: unknown;
}

/** Takes back the last edit of a draft; call again for the one before it. */
export const undoPlanEdit = defineUseCase({
  name: "undo-plan-edit",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({ planId: z.uuid(), version: z.int() }),
  async run(deps, actor, { planId, version }) {
    return deps.db.transaction().execute(async (trx) => {
      const plan = await lockPlan(trx, planId);
      if (!plan) throw notFound("This plan");
      assertDraft(plan, version);
      const step = await lastPlanStep(trx, planId);
      if (!step) throw conflict("There is nothing to undo in this plan.");
      const kept = step.content as Kept;
      await replaceRounds(trx, planId, kept.rounds.map(revived));
      await replaceLeftOut(trx, planId, kept.leftOut);
      await deletePlanStep(trx, planId, step.version);
      const next = await changePlan(trx, planId, { cost: kept.cost });
      await appendAudit(trx, {
        at: deps.now(),
        personId: personIdOf(actor),
        act: "undo-plan-edit",
        subjectKind: "plan",
        subjectId: planId,
        detail: { undone: step.act },
      });
      return { planId, version: next, undone: step.words };
    });
  },
});

/** Instants went through JSON as text. */
function revived(round: Kept["rounds"][number]): StoredRound {
  return {
    ...round,
    startsAt: new Date(round.startsAt),
    endsAt: new Date(round.endsAt),
    stops: round.stops.map((stop) => ({
      ...stop,
      arrivesAt: new Date(stop.arrivesAt),
      departsAt: new Date(stop.departsAt),
    })),
  };
}

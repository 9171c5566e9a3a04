import { z } from "zod";
import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { appendAudit } from "@/db/queries/audit";
import { bookedSwaps, findRound } from "@/db/queries/plan-rounds";
import { deletePlanSteps } from "@/db/queries/plan-steps";
import { changePlan, lockPlan, type PlanRow } from "@/db/queries/plans";
import {
  adoptRound,
  bindRound,
  cancelRound,
  changeBindingRound,
  swappedMeanwhile,
} from "@/db/queries/publish-rounds";
import { loadRoundSheets } from "@/db/queries/round-sheets";
import { lockStopsOfDays, noteOrderReplaced } from "@/db/queries/stop-order";
import { conflict, notFound } from "@/lib/errors";
import { assertDraft } from "./open-plan";
import { changeWords, type DayChange } from "./publication";
import { type Publication, readPublication } from "./read-publication";
import { queueMail } from "./queue-mail";
import { roundMail } from "./round-mail";
import { tellContacts } from "./tell-contacts";
import { type Actor, type Deps, defineUseCase, personIdOf } from "./use-case";

/**
 * Makes a draft's rounds binding and sends them out: one mail with a calendar file to each
 * technician whose day is new, changed or cancelled, and to nobody else. Site contacts are told
 * when asked for.
 */
export const publishPlan = defineUseCase({
  name: "publish-plan",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({
    planId: z.uuid(),
    version: z.int(),
    tellContacts: z.boolean().default(false),
  }),
  async run(deps, actor, { planId, version, tellContacts: tell }) {
    return deps.db.transaction().execute(async (trx) => {
      const plan = await lockPlan(trx, planId);
      if (!plan) throw notFound("This plan");
      assertDraft(plan, version);
      // A technician's own order that is on its way waits here, or has been seen.
      await lockStopsOfDays(trx, plan.firstDay, plan.lastDay);
      const publication = await readPublication(trx, deps.now(), plan);
      await refuseUnsound(trx, publication);
      const sent = await apply(trx, deps, publication);
      const at = deps.now();
      const next = await changePlan(trx, planId, {
        state: "published",
        publishedAt: at,
        publishedBy: personIdOf(actor),
      });
      await deletePlanSteps(trx, planId);
      const told = tell ? await tellContacts(trx, deps, publication) : 0;
      await note(trx, deps, actor, plan, publication);
      return { planId, version: next, mails: sent, contactsTold: told };
    });
  },
});

/** @throws AppError conflict naming what has to be mended first */
async function refuseUnsound(
  trx: Transaction<Database>,
  { changes, stranded, technicianIds, plan }: Publication,
): Promise<void> {
  if (stranded.length > 0) {
    throw conflict(`${stranded.join("; ")}. Move these stops or take them out first.`);
  }
  const swaps = changes.flatMap(({ draft }) =>
    (draft?.stops ?? []).flatMap((s) => s.tasks.filter((task) => task.kind === "swap")),
  );
  const packIds = swaps.flatMap((task) => task.packId ?? []);
  const swapped = await swappedMeanwhile(trx, packIds);
  if (swapped.length > 0) {
    const tags = swapped.slice(0, 5).join(", ");
    throw conflict(`Swapped since this plan was made: ${tags}. Take them out, or build again.`);
  }
  const assets = new Set(swaps.map((task) => task.assetId));
  const booked = await bookedSwaps(trx, plan.firstDay);
  const covered = (swap: { technicianId: string; day: string; state: string }) =>
    swap.state === "published" && technicianIds.has(swap.technicianId) && swap.day <= plan.lastDay;
  if (booked.some((swap) => assets.has(swap.assetId) && !covered(swap))) {
    throw conflict("Some of these swaps stand in another published round by now. Build again.");
  }
  if (changes.every(({ news }) => news === "unchanged")) {
    throw conflict("There is nothing new in this plan to publish.");
  }
}

/** Cancels first, so that a technician's day is free for what comes. @returns mails ordered */
async function apply(
  trx: Transaction<Database>,
  deps: Deps,
  publication: Publication,
): Promise<number> {
  const order = { cancelled: 0, changed: 1, published: 2, unchanged: 3 };
  const changes = [...publication.changes].sort((a, b) => order[a.news] - order[b.news]);
  let sent = 0;
  for (const change of changes) {
    const bound = await applyDay(trx, change, deps.now());
    if (change.news === "unchanged") continue;
    await tellTechnician(trx, deps, publication, change, bound);
    sent += 1;
  }
  return sent;
}

async function applyDay(
  trx: Transaction<Database>,
  { news, draft, before, ownOrder }: DayChange,
  at: Date,
): Promise<{ readonly roundId: string; readonly sequence: number }> {
  if (news === "cancelled" && before) {
    return { roundId: before.id, sequence: await cancelRound(trx, before.id) };
  }
  if (!draft) throw new Error("a round that is not cancelled stands in the draft");
  if (!before) {
    await bindRound(trx, draft.id, at);
    return { roundId: draft.id, sequence: draft.icalSequence };
  }
  if (news === "changed") {
    if (ownOrder === "replaced") await noteOrderReplaced(trx, before.id, at);
    return { roundId: before.id, sequence: await changeBindingRound(trx, before, draft, at) };
  }
  await adoptRound(trx, before, draft);
  return { roundId: before.id, sequence: before.icalSequence };
}

async function tellTechnician(
  trx: Transaction<Database>,
  deps: Deps,
  { organisation, technicians, siteNames }: Publication,
  change: DayChange,
  bound: { readonly roundId: string; readonly sequence: number },
): Promise<void> {
  const round = await findRound(trx, bound.roundId);
  const technician = technicians.find((t) => t.id === change.technicianId);
  if (!round || !technician || change.news === "unchanged") return;
  const order = roundMail(organisation, deps.appUrl, {
    news: change.news,
    round,
    technician,
    stops: await loadRoundSheets(trx, [round.id]),
    changes: changeWords(change, siteNames),
    sequence: bound.sequence,
    at: deps.now(),
  });
  await queueMail(trx, deps, order);
}

async function note(
  trx: Transaction<Database>,
  deps: Deps,
  actor: Actor,
  plan: PlanRow,
  { changes }: Publication,
): Promise<void> {
  const count = (news: DayChange["news"]) => changes.filter((c) => c.news === news).length;
  await appendAudit(trx, {
    at: deps.now(),
    personId: personIdOf(actor),
    act: "publish-plan",
    subjectKind: "plan",
    subjectId: plan.id,
    detail: {
      name: plan.name,
      published: count("published"),
      changed: count("changed"),
      cancelled: count("cancelled"),
    },
  });
}

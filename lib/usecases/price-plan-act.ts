import { z } from "zod";
import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import { findAssetSite } from "@/db/queries/asset-site";
import { loadPlanRounds, type StoredRound } from "@/db/queries/plan-rounds";
import type { PlanRow } from "@/db/queries/plans";
import { conflict, notFound } from "@/lib/errors";
import { priceAct, type ActPrice } from "@/lib/planning/edits";
import { type ExtraVisit, getPlan, type OpenPlan, openPlan } from "./open-plan";
import { dayWriter, editOf, type PlanAct, planActSchema } from "./plan-acts";
import { type Deps, defineUseCase } from "./use-case";

/** What an act would do, or why it cannot be done. */
export const pricePlanAct = defineUseCase({
  name: "price-plan-act",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ planId: z.uuid(), act: planActSchema }),
  async run(deps, _actor, { planId, act }) {
    const plan = await getPlan(deps.db, planId);
    const { price } = await openAndPrice(deps, deps.db, plan, act, touchedBy(act));
    const { routes: _, ...words } = price;
    return words;
  },
});

/** The rounds that an act takes from or puts into. */
function touchedBy(act: PlanAct): (round: StoredRound) => boolean {
  const into = (round: StoredRound) =>
    act.kind !== "remove" && round.technicianId === act.technicianId && round.day === act.day;
  const from = (round: StoredRound) =>
    (act.kind === "move" || act.kind === "remove") &&
    round.stops.some((stop) => stop.siteId === act.siteId);
  // An asset comes to its site's visit, wherever that stands; so all rounds may be touched.
  return act.kind === "add" ? () => true : (round) => into(round) || from(round);
}

/** Opens the plan with what the act needs and prices the act. */
export async function openAndPrice(
  deps: Deps,
  db: Kysely<Database>,
  plan: PlanRow,
  act: PlanAct,
  concerns?: (round: StoredRound) => boolean,
): Promise<{ open: OpenPlan; price: ActPrice }> {
  const brought = act.kind === "add" ? await visitToAdd(db, plan, act) : null;
  const open = await openPlan(deps, db, plan, {
    extra: brought ? [brought] : [],
    ...(concerns && { concerns }),
  });
  const price = priceAct(
    open.problem,
    open.routes,
    editOf(open, act, brought?.siteId ?? null),
    dayWriter(open),
  );
  return { open, price };
}

/** The visit that adding an asset brings: its swap, with what the plan does there already. */
export async function visitToAdd(
  db: Kysely<Database>,
  plan: PlanRow,
  act: { readonly assetId: string },
): Promise<ExtraVisit> {
  const asset = await findAssetSite(db, act.assetId);
  if (!asset) throw notFound("This asset");
  if (!asset.packId || !asset.cellTypeId) {
    throw conflict(`${asset.tag} has no pack in it. Record the installation first.`);
  }
  const rounds = await loadPlanRounds(db, plan.id);
  const there = rounds.flatMap((round) =>
    round.stops.filter((stop) => stop.siteId === asset.siteId).map((stop) => ({ round, stop })),
  )[0];
  if (there?.stop.tasks.some((task) => task.assetId === act.assetId)) {
    throw conflict(`${asset.tag} is in this plan already.`);
  }
  const swap = {
    kind: "swap" as const,
    assetId: act.assetId,
    packId: asset.packId,
    cellTypeId: asset.cellTypeId,
    cells: asset.cells,
  };
  const kept = there?.stop.tasks.map(({ id: _, ...task }) => task) ?? [];
  return { siteId: asset.siteId, tasks: [...kept, swap] };
}

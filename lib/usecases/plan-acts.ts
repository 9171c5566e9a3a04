import { z } from "zod";
import { AppError, invalid, notFound } from "@/lib/errors";
import { slotIndex, visitIndex } from "@/lib/planning/edits";
import { notWorkingWords } from "@/lib/planning/refusal-words";
import type { Edit } from "@/lib/routing/evaluate";
import { formatDay } from "@/lib/present/format-day";
import type { OpenPlan } from "./open-plan";

const day = z.iso.date();
const position = z.int().min(1).max(200).optional();

/** What a dispatcher can do to a draft. Sites name stops: a plan visits a site once. */
export const planActSchema = z.discriminatedUnion("kind", [
  z.object({
    kind: z.literal("move"),
    siteId: z.uuid(),
    technicianId: z.uuid(),
    day,
    position,
  }),
  z.object({
    kind: z.literal("add"),
    assetId: z.uuid(),
    technicianId: z.uuid(),
    day,
    position,
  }),
  z.object({ kind: z.literal("remove"), siteId: z.uuid() }),
  z.object({
    kind: z.literal("reorder"),
    technicianId: z.uuid(),
    day,
    siteIds: z.array(z.uuid()).min(1),
  }),
]);
export type PlanAct = z.infer<typeof planActSchema>;

/** How days are written in refusals. */
export function dayWriter(open: OpenPlan): (day: string) => string {
  const { locale } = open.world.organisation;
  const today = open.plan.firstDay;
  return (at) => formatDay(at, locale, { weekday: true, today });
}

function slotFor(open: OpenPlan, technicianId: string, onDay: string): number {
  const slot = slotIndex(open.problem, technicianId, onDay);
  if (slot >= 0) return slot;
  const technician = open.world.input.technicians.find((t) => t.technicianId === technicianId);
  if (!technician) throw notFound("This technician");
  const why = notWorkingWords(technician, onDay);
  const words = why ?? `${dayWriter(open)(onDay)} is over or outside this plan`;
  throw new AppError("conflict", `It cannot go there: ${words}.`);
}

function visitAt(open: OpenPlan, siteId: string): number {
  const visit = visitIndex(open.problem, siteId);
  if (visit < 0) throw notFound("This stop");
  return visit;
}

/** The act in the routing engine's words. @throws AppError not_found | conflict with the reason */
export function editOf(open: OpenPlan, act: PlanAct, siteOfAsset: string | null): Edit {
  switch (act.kind) {
    case "remove":
      return { kind: "remove", site: visitAt(open, act.siteId) };
    case "reorder": {
      const slot = slotFor(open, act.technicianId, act.day);
      const order = act.siteIds.map((siteId) => visitAt(open, siteId));
      if ([...order].sort().join() !== [...(open.routes[slot] ?? [])].sort().join()) {
        throw invalid("The new order must hold the same stops.", [
          { field: "siteIds", message: "Name every stop of the round once." },
        ]);
      }
      return { kind: "reorder", slot, order };
    }
    case "move":
    case "add": {
      const site = visitAt(open, act.kind === "move" ? act.siteId : (siteOfAsset ?? ""));
      const slot = slotFor(open, act.technicianId, act.day);
      const at = act.position === undefined ? {} : { position: act.position - 1 };
      return { kind: "move", site, slot, ...at };
    }
  }
}

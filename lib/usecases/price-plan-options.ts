import { z } from "zod";
import { notFound } from "@/lib/errors";
import { priceAct, visitIndex } from "@/lib/planning/edits";
import { notWorkingWords } from "@/lib/planning/refusal-words";
import { daysFrom } from "@/lib/planning/local-time";
import { actPriceWords, type ActPriceWords } from "@/lib/present/rounds-board";
import { getPlan, type OpenPlan, openPlan } from "./open-plan";
import { dayWriter } from "./plan-acts";
import { visitToAdd } from "./price-plan-act";
import { defineUseCase } from "./use-case";

export interface PlaceOption extends ActPriceWords {
  readonly technicianId: string;
  readonly technician: string;
  readonly day: string;
  readonly dayLabel: string;
  /** Where the stop stands now. */
  readonly here: boolean;
}

/** What it would do to put one stop (or an asset that is left out) on each technician's day. */
export const pricePlanOptions = defineUseCase({
  name: "price-plan-options",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z
    .object({ planId: z.uuid(), siteId: z.uuid().nullable(), assetId: z.uuid().nullable() })
    .refine((input) => input.siteId !== null || input.assetId !== null, {
      error: "Name a site or an asset.",
    }),
  async run(deps, _actor, { planId, siteId, assetId }) {
    const plan = await getPlan(deps.db, planId);
    const extra = assetId ? [await visitToAdd(deps.db, plan, { assetId })] : [];
    const open = await openPlan(deps, deps.db, plan, { extra });
    const site = visitIndex(open.problem, siteId ?? extra[0]?.siteId ?? "");
    if (site < 0) throw notFound("This stop");
    const options = [...priced(open, site), ...impossible(open)];
    return { options, removal: siteId ? removalOf(open, site) : null };
  },
});

function priced(open: OpenPlan, site: number): PlaceOption[] {
  const write = dayWriter(open);
  return open.problem.slots.map(({ technician, day }, slot) => {
    const here = open.routes[slot]?.includes(site) ?? false;
    const price = priceAct(open.problem, open.routes, { kind: "move", site, slot }, write);
    return {
      technicianId: technician.technicianId,
      technician: technician.name,
      day,
      dayLabel: write(day),
      here,
      ...actPriceWords(price, open.world.organisation),
    };
  });
}

/** Days on which a technician does not drive, with the reason. */
function impossible(open: OpenPlan): PlaceOption[] {
  const write = dayWriter(open);
  return open.world.input.technicians.flatMap((technician) =>
    daysFrom(open.plan.firstDay, open.plan.lastDay).flatMap((day) => {
      const words = notWorkingWords(technician, day);
      if (words === null) return [];
      const { technicianId, name } = technician;
      const option = { technicianId, technician: name, day, dayLabel: write(day), here: false };
      return [{ ...option, allowed: false, words, short: "no", cheaper: false }];
    }),
  );
}

function removalOf(open: OpenPlan, site: number): ActPriceWords {
  const price = priceAct(open.problem, open.routes, { kind: "remove", site }, dayWriter(open));
  return actPriceWords(price, open.world.organisation);
}

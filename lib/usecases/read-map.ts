import { z } from "zod";
import { loadMapPacks } from "@/db/queries/map-packs";
import { getOrganisation } from "@/db/queries/organisation";
import { loadTechniciansToPlan } from "@/db/queries/planning-fleet";
import { plansWithin } from "@/db/queries/plans";
import { addDays, localDay, mondayOf } from "@/lib/planning/local-time";
import { mapPack } from "@/lib/present/map-pack";
import { boardRound } from "@/lib/present/rounds-board";
import { MS_PER_DAY } from "@/lib/units";
import { boardInputs, roundsShown } from "./rounds-of-week";
import { defineUseCase } from "./use-case";

/** Packs on the map by when they are due, and the rounds of a week. */
export const readMap = defineUseCase({
  name: "read-map",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({
    within: z.enum(["0", "30", "90", "all"]).catch("90"),
    week: z.iso.date().nullable().catch(null),
  }),
  async run(deps, _actor, { within, week }) {
    const organisation = await getOrganisation(deps.db);
    const now = deps.now();
    const today = localDay(now, organisation.timeZone);
    const until = within === "all" ? null : new Date(now.getTime() + Number(within) * MS_PER_DAY);
    const monday = mondayOf(week ?? today);
    const days = { firstDay: monday, lastDay: addDays(monday, 6) };
    const [packs, technicians, plans] = await Promise.all([
      loadMapPacks(deps.db, until),
      loadTechniciansToPlan(deps.db, []),
      plansWithin(deps.db, days.firstDay, days.lastDay),
    ]);
    const drafts = plans.filter((plan) => plan.state === "draft");
    const rounds = await roundsShown(deps.db, technicians, days, drafts);
    const inputs = await boardInputs(deps.db, technicians, rounds);
    return {
      within,
      monday,
      tileUrl: organisation.mapTileUrl,
      packs: packs.map((pack) => mapPack(pack, today, organisation)),
      rounds: inputs.map((round) => boardRound(round, today, organisation)),
    };
  },
});
export type MapView = Awaited<ReturnType<typeof readMap>>;

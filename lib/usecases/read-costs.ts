import { z } from "zod";
import { removalsByMonth, roundsByMonth } from "@/db/queries/costs";
import { getOrganisation } from "@/db/queries/organisation";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { MS_PER_DAY } from "@/lib/units";
import { defineUseCase } from "./use-case";

export interface MonthOfCosts {
  /** YYYY-MM */
  readonly month: string;
  readonly removals: number;
  readonly early: number;
  readonly due: number;
  readonly stopped: number;
  readonly silentHours: number;
  readonly cellsMinor: number;
  readonly crewMinor: number;
  readonly travelMinor: number;
  readonly rounds: number;
  readonly kilometres: number;
  /** Charge thrown away as a share of rated, of those packs whose forecast is kept. */
  readonly thrownShare: number | null;
}

/** What swapping cost, month by month. */
export const readCosts = defineUseCase({
  name: "read-costs",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ days: z.coerce.number().int().min(30).max(3650).catch(730) }),
  async run(deps, _actor, input) {
    const organisation = await getOrganisation(deps.db);
    const since = new Date(deps.now().getTime() - input.days * MS_PER_DAY);
    const [removals, rounds] = await Promise.all([
      removalsByMonth(deps.db, since, organisation.timeZone),
      roundsByMonth(deps.db, dayOfInstant(since, organisation.timeZone)),
    ]);
    const driven = new Map(rounds.map((row) => [row.month, row]));
    const months = removals.map((row): MonthOfCosts => {
      const round = driven.get(row.month);
      const hours = (round?.seconds ?? 0) / 3600;
      const kilometres = (round?.metres ?? 0) / 1000;
      return {
        ...row,
        rounds: round?.rounds ?? 0,
        kilometres,
        crewMinor: hours * organisation.crewCostMinorPerHour,
        travelMinor: kilometres * organisation.travelCostMinorPerKm,
        thrownShare: row.ratedMah > 0 ? row.thrownMah / row.ratedMah : null,
      };
    });
    return { organisation, input, months };
  },
});
export type CostsView = Awaited<ReturnType<typeof readCosts>>;

import { z } from "zod";
import {
  cutoffsByWeek,
  HORIZON_ORDERS,
  horizonPage,
  type HorizonFilter,
} from "@/db/queries/horizon";
import {
  bookedHours,
  cellsToLoad,
  chancesWithin,
  chargeThrownAway,
  outNow,
} from "@/db/queries/horizon-figures";
import { listCrewNames } from "@/db/queries/crew-names";
import { findingKindsByPack } from "@/db/queries/findings";
import { getOrganisation } from "@/db/queries/organisation";
import { dayFromNumber, dayNumber, dayOfInstant } from "@/lib/present/calendar-days";
import { countQuantile, poissonBinomial } from "@/lib/stats/poisson-binomial";
import { MS_PER_DAY } from "@/lib/units";
import { type Deps, defineUseCase } from "./use-case";

export const HORIZON_PAGE_SIZE = 100;
/** Weeks in the head of the strips. */
const WEEKS = 30;
const FIGURE_DAYS = 14;
const BIN_DAYS = 90;

export const horizonInput = z.object({
  within: z.enum(["30", "90", "365", "all"]).catch("90"),
  crew: z.uuid().nullable().catch(null),
  chemistry: z.string().nullable().catch(null),
  notBooked: z.boolean().catch(false),
  search: z.string().trim().max(80).catch(""),
  order: z.enum(HORIZON_ORDERS).catch("waiting"),
  descending: z.boolean().catch(true),
  page: z.coerce.number().int().min(1).catch(1),
  pageSize: z.number().int().min(1).max(50_000).catch(HORIZON_PAGE_SIZE),
});

/** One page of everything in service by when it will reach cut-off, with its figures. */
export const readHorizon = defineUseCase({
  name: "read-horizon",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: horizonInput,
  async run(deps, _actor, input) {
    const organisation = await getOrganisation(deps.db);
    const from = { now: deps.now(), today: dayOfInstant(deps.now(), organisation.timeZone) };
    const filter: HorizonFilter = {
      withinDays: input.within === "all" ? null : Number(input.within),
      crewId: input.crew,
      chemistry: input.chemistry,
      notBooked: input.notBooked,
      search: input.search,
    };
    const [rows, weeks, figures, crews, findings] = await Promise.all([
      horizonPage(
        deps.db,
        filter,
        {
          order: input.order,
          descending: input.descending,
          limit: input.pageSize,
          offset: (input.page - 1) * input.pageSize,
        },
        from,
      ),
      cutoffsByWeek(deps.db, filter, WEEKS, from),
      readFigures(deps, input.crew, from),
      listCrewNames(deps.db),
      findingKindsByPack(deps.db),
    ]);
    return { organisation, ...from, input, rows, weeks, figures, crews, findings };
  },
});
export type HorizonView = Awaited<ReturnType<typeof readHorizon>>;

async function readFigures(deps: Deps, crew: string | null, from: { now: Date; today: string }) {
  const days = weekOf(from.today);
  const [chances, out, hours, cells, thrownAway] = await Promise.all([
    chancesWithin(deps.db, crew, FIGURE_DAYS, from),
    outNow(deps.db, crew),
    bookedHours(deps.db, crew, days),
    cellsToLoad(deps.db, crew, days),
    chargeThrownAway(deps.db, crew, new Date(from.now.getTime() - BIN_DAYS * MS_PER_DAY)),
  ]);
  const mass = poissonBinomial(chances);
  return {
    dueSoon: {
      days: FIGURE_DAYS,
      mean: chances.reduce((sum, chance) => sum + chance, 0),
      low: countQuantile(mass, 0.05),
      high: countQuantile(mass, 0.95),
    },
    out: { count: out.count, oldest: out.oldest },
    hours,
    cells,
    thrownAway,
    binDays: BIN_DAYS,
  };
}

/** Monday to Sunday of the ISO week of a day. */
function weekOf(today: string): string[] {
  const day = dayNumber(today);
  const monday = day - ((day + 3) % 7);
  return Array.from({ length: 7 }, (_, i) => dayFromNumber(monday + i));
}

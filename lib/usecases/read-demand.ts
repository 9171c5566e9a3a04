import { z } from "zod";
import { loadPacksThatWillAsk } from "@/db/queries/cell-demand";
import { listCellTypes } from "@/db/queries/cell-types";
import { getOrganisation } from "@/db/queries/organisation";
import {
  type CellDemand,
  demandBetween,
  type PackDemand,
  proposeOrder,
} from "@/lib/planning/demand";
import { dayOfNumber, instantOfWall, localDay } from "@/lib/planning/local-time";
import { type EpochDays, type IsoDay, toEpochDays } from "@/lib/units";
import { groupBy } from "./forecast-input";
import { defineUseCase } from "./use-case";

/** How far ahead a shortage is looked for. */
const HORIZON_DAYS = 365;

/** What the fleet will ask of the stores month by month, and what to order when. */
export const readDemand = defineUseCase({
  name: "read-demand",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ months: z.coerce.number().int().min(1).max(24).catch(6) }),
  run: async (deps, _actor, input) => {
    const organisation = await getOrganisation(deps.db);
    const [types, packs] = await Promise.all([
      listCellTypes(deps.db),
      loadPacksThatWillAsk(deps.db),
    ]);
    const now = deps.now();
    const months = monthsFrom(now, input.months, organisation.timeZone);
    const asking = groupBy(packs.map(demandOf), (pack) => pack.cellTypeId);
    const rows = types
      .filter((type) => asking.has(type.id) || type.inStock > 0)
      .map((type) => {
        const own = asking.get(type.id) ?? [];
        return { type, packs: own.length, ...demandRow(own, type, months, toEpochDays(now)) };
      });
    return { organisation, now, months: months.map((month) => month.month), rows };
  },
});

export type DemandView = Awaited<ReturnType<typeof readDemand>>;

interface Month {
  /** Its first day. */
  readonly month: IsoDay;
  readonly endsAt: EpochDays;
}

/** The running month and those after it, by the organisation's calendar. */
function monthsFrom(now: Date, count: number, timeZone: string): Month[] {
  const [year, month] = localDay(now, timeZone).split("-").map(Number) as [number, number, number];
  const firstOf = (ahead: number) =>
    new Date(Date.UTC(year, month - 1 + ahead, 1)).toISOString().slice(0, 10);
  return Array.from({ length: count }, (_, i) => ({
    month: firstOf(i),
    endsAt: toEpochDays(instantOfWall(firstOf(i + 1), 0, timeZone)),
  }));
}

function demandOf(row: Awaited<ReturnType<typeof loadPacksThatWillAsk>>[number]) {
  return {
    cellTypeId: row.cellTypeId,
    life: row.cdfDays,
    installedAt: toEpochDays(row.installedAt),
    cells: row.cells,
  };
}

function demandRow(
  packs: readonly PackDemand[],
  type: { inStock: number; leadTimeDays: number; shelfLifeMonths: number | null },
  months: readonly Month[],
  now: EpochDays,
) {
  const byMonth: CellDemand[] = months.map((month, i) =>
    demandBetween(packs, i === 0 ? null : months[i - 1]!.endsAt, month.endsAt),
  );
  const total = demandBetween(packs, null, months.at(-1)!.endsAt);
  const { shortFrom, orderBy, ...order } = proposeOrder(packs, type, now, HORIZON_DAYS);
  return {
    byMonth,
    total,
    order: { ...order, shortFrom: dayOf(shortFrom), orderBy: dayOf(orderBy) },
  };
}

function dayOf(day: EpochDays | null): IsoDay | null {
  return day === null ? null : dayOfNumber(day);
}

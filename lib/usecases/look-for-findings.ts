import { z } from "zod";
import { type FoundFinding, replaceFindings } from "@/db/queries/findings";
import {
  loadForecastCatalogue,
  loadPacksToForecast,
  loadReadingsToForecast,
} from "@/db/queries/forecast-inputs";
import { findOrganisation } from "@/db/queries/organisation";
import { listWatchedPacks, type WatchedPackRow } from "@/db/queries/watched-packs";
import { forecastPack } from "@/lib/battery";
import { type DepthObservation, drawObservations } from "@/lib/battery/draw-observations";
import { type FleetFindings, type WatchedPack, watchFleet } from "@/lib/battery/fleet-watch";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { fromEpochDays, MS_PER_DAY, toEpochDays } from "@/lib/units";
import {
  arrangeCatalogue,
  type ForecastCatalogue,
  forecastInputOf,
  groupBy,
  withoutFindings,
} from "./forecast-input";
import { type Deps, defineUseCase } from "./use-case";

/** Older packs say little of what is bought and installed today. */
const LOOKED_BACK_DAYS = 3 * 366;
const BATCH = 500;
/** PostgreSQL's `real` ends near 1e-38; below this nobody asks how small. */
const LEAST_CHANCE = 1e-30;

/** Looks over the whole fleet for bad lots and draws that shifted, and keeps what it finds. */
export const lookForFindings = defineUseCase({
  name: "look-for-findings",
  allow: { system: true },
  input: z.object({}),
  async run(deps): Promise<{ findings: number }> {
    const organisation = await findOrganisation(deps.db);
    if (!organisation) return { findings: 0 };
    const now = deps.now();
    const since = new Date(now.getTime() - LOOKED_BACK_DAYS * MS_PER_DAY);
    const stored = await loadForecastCatalogue(deps.db);
    // what was found before must not speak for itself
    const catalogue = withoutFindings(arrangeCatalogue(stored));
    const rows = await listWatchedPacks(deps.db, since, now);
    const observations = await observe(deps, catalogue, rows);
    const found = watchFleet(await watched(deps, catalogue, rows), observations);
    const kept = rowsOf(found, deps.newId, organisation.timeZone);
    await deps.db.transaction().execute((trx) => replaceFindings(trx, kept, now));
    return { findings: kept.length };
  },
});

function rowsOf(found: FleetFindings, newId: () => string, timeZone: string): FoundFinding[] {
  const chanceOf = (chance: number) => Math.min(1, Math.max(LEAST_CHANCE, chance));
  return [
    ...found.lots.map((lot): FoundFinding => ({
      ...{ id: newId(), kind: "bad-lot", lotId: lot.lot, deviceModelId: null, since: null },
      ...{ factor: lot.lifeFactor, chance: chanceOf(lot.chance), relativeSd: null },
      packsBehind: lot.packKeys.length,
    })),
    ...found.shifts.map((shift): FoundFinding => ({
      ...{ id: newId(), kind: "draw-shift", lotId: null, deviceModelId: shift.model },
      since: dayOfInstant(fromEpochDays(shift.at), timeZone),
      ...{ factor: shift.factor, chance: chanceOf(shift.chance), relativeSd: shift.relativeSd },
      packsBehind: shift.packKeys.length,
    })),
  ];
}

/** Draws read from the voltages of these packs, in batches: memory stays flat. */
async function observe(
  deps: Deps,
  catalogue: ForecastCatalogue,
  rows: readonly WatchedPackRow[],
): Promise<DepthObservation[]> {
  const seen: DepthObservation[] = [];
  for (let from = 0; from < rows.length; from += BATCH) {
    const ids = rows.slice(from, from + BATCH).map((row) => row.packId);
    const [installed, removed, readings] = await Promise.all([
      loadPacksToForecast(deps.db, ids),
      loadPacksToForecast(deps.db, ids, "removed"),
      loadReadingsToForecast(deps.db, ids),
    ]);
    const readingsOf = groupBy(readings, (row) => row.packId);
    for (const pack of [...installed, ...removed]) {
      const own = readingsOf.get(pack.packId) ?? [];
      const input = forecastInputOf(catalogue, pack, own, [], null, deps.now());
      const observed = { packKey: pack.packId, model: pack.deviceModelId, pack: input.pack };
      seen.push(...drawObservations({ ...observed, readings: input.readings }));
    }
  }
  return seen;
}

const cohortOf = (row: WatchedPackRow) =>
  `${row.deviceModelId} ${row.cellTypeId} ${row.climateId ?? ""}`;

/** Lives against what the sheet promised; packs still in have lived so far. */
async function watched(
  deps: Deps,
  catalogue: ForecastCatalogue,
  rows: readonly WatchedPackRow[],
): Promise<WatchedPack[]> {
  const promised = await promisedDaysOf(deps, catalogue, rows);
  return rows.map((row) => ({
    packKey: row.packId,
    deviceKey: row.assetId,
    cohort: cohortOf(row),
    lot: row.lotId,
    model: row.deviceModelId,
    cellType: row.cellTypeId,
    ranOut: row.ranOut,
    until: toEpochDays(row.until),
    lifeRatio: (row.until.getTime() - row.installedAt.getTime()) / MS_PER_DAY / promised(row),
  }));
}

/**
 * What the sheet promised a pack: kept with its outcome, or the figure of one pack of its cohort
 * worked out now (the season of the installation aside, they are the same).
 */
async function promisedDaysOf(
  deps: Deps,
  catalogue: ForecastCatalogue,
  rows: readonly WatchedPackRow[],
): Promise<(row: WatchedPackRow) => number> {
  const examples = new Map(
    rows.filter((row) => row.promisedDays === null).map((row) => [cohortOf(row), row.packId]),
  );
  const ids = [...examples.values()];
  const packs =
    ids.length === 0
      ? []
      : [
          ...(await loadPacksToForecast(deps.db, ids)),
          ...(await loadPacksToForecast(deps.db, ids, "removed")),
        ];
  const lives = new Map(
    packs.map((pack) => {
      const unread = { ...pack, lastHeardAt: null, measuredAverageUa: null };
      const input = forecastInputOf(catalogue, unread, [], [], null, pack.installedAt);
      return [pack.packId, forecastPack(input).quantiles.p50 - input.pack.installedAt] as const;
    }),
  );
  return (row) =>
    Math.max(1, row.promisedDays ?? lives.get(examples.get(cohortOf(row)) ?? "") ?? 1);
}

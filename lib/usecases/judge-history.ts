import { z } from "zod";
import {
  type DeviceEventRow,
  loadDeviceEvents,
  loadForecastCatalogue,
  loadPacksToForecast,
  loadReadingsToForecast,
  type PackToForecast,
  type ReadingToForecast,
} from "@/db/queries/forecast-inputs";
import { insertOutcomes, type OutcomeRow, unjudgedPackIds } from "@/db/queries/outcomes";
import { chanceOutBy, forecastPack } from "@/lib/battery";
import { fromEpochDays, MS_PER_DAY, toEpochDays } from "@/lib/units";
import {
  arrangeCatalogue,
  type ForecastCatalogue,
  forecastInputOf,
  groupBy,
} from "./forecast-input";
import { type Deps, defineUseCase } from "./use-case";

const BATCH = 500;

/** The forecast that is judged is the one of the evening before the visit. */
const BEFORE_VISIT_MS = MS_PER_DAY / 2;

/**
 * For packs that came out before forecasts were kept (imported history): works out what the
 * forecast would have said on the day before the visit, from nothing but what was known then,
 * and keeps it beside what happened.
 */
export const judgeHistory = defineUseCase({
  name: "judge-history",
  allow: { system: true },
  input: z.object({}),
  async run(deps): Promise<{ judged: number }> {
    const catalogue = arrangeCatalogue(await loadForecastCatalogue(deps.db));
    let judged = 0;
    for (;;) {
      const packIds = await unjudgedPackIds(deps.db, BATCH);
      if (packIds.length === 0) return { judged };
      await insertOutcomes(deps.db, await judgeBatch(deps, catalogue, packIds));
      judged += packIds.length;
    }
  },
});

async function judgeBatch(
  deps: Deps,
  catalogue: ForecastCatalogue,
  packIds: readonly string[],
): Promise<OutcomeRow[]> {
  const packs = await loadPacksToForecast(deps.db, packIds, "removed");
  const assetIds = packs.map((pack) => pack.assetId);
  const readings = groupBy(await loadReadingsToForecast(deps.db, packIds), (row) => row.packId);
  const events = groupBy(await loadDeviceEvents(deps.db, assetIds), (row) => row.assetId);
  return packs.map((pack) =>
    judgePack(
      catalogue,
      pack,
      readings.get(pack.packId) ?? [],
      events.get(pack.assetId) ?? [],
      deps.now(),
    ),
  );
}

function judgePack(
  catalogue: ForecastCatalogue,
  pack: PackToForecast,
  readings: readonly ReadingToForecast[],
  events: readonly DeviceEventRow[],
  recordedAt: Date,
): OutcomeRow {
  const removedAt = pack.removedAt ?? recordedAt;
  const at = new Date(Math.max(pack.installedAt.getTime(), removedAt.getTime() - BEFORE_VISIT_MS));
  const known = { ...pack, lastHeardAt: null };
  const before = <Row extends { at: Date }>(rows: readonly Row[]) =>
    rows.filter((row) => row.at < at && (pack.stoppedAt === null || row.at < pack.stoppedAt));
  const forecast = forecastPack(
    forecastInputOf(catalogue, known, before(readings), before(events), null, at),
  );
  const { quantiles: q } = forecast;
  return {
    packId: pack.packId,
    recordedAt,
    forecastAt: at,
    p05: fromEpochDays(q.p05),
    p20: fromEpochDays(q.p20),
    p50: fromEpochDays(q.p50),
    p80: fromEpochDays(q.p80),
    p95: fromEpochDays(q.p95),
    shareLeftPermille: Math.round(forecast.shareLeft.p50 * 1000),
    censored: pack.stoppedAt === null,
    endedAt: pack.stoppedAt ?? removedAt,
    chanceStoppedPermille: Math.round(chanceOutBy(forecast, toEpochDays(removedAt)) * 1000),
    inHindsight: true,
  };
}

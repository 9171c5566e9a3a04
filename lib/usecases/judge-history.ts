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

/** Voltages taken this shortly before the removal belong to the same visit. */
const SAME_VISIT_MS = MS_PER_DAY / 2;

/**
 * For packs that came out before forecasts were kept (imported history): works out what the
 * forecast would have said at the last visit before the removal, from nothing but what was
 * known then, and keeps it beside what happened. A later moment would not do: many a removal
 * comes because the device fell silent, and a forecast made on the eve of such a visit would be
 * one chosen by its outcome.
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
  const end = pack.stoppedAt ?? removedAt;
  const until = Math.min(end.getTime(), removedAt.getTime() - SAME_VISIT_MS);
  const before = <Row extends { at: Date }>(rows: readonly Row[]) =>
    rows.filter((row) => row.at.getTime() < until);
  const at = before(readings).at(-1)?.at ?? pack.installedAt;
  const known = { ...pack, lastHeardAt: null };
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
    endedAt: end,
    chanceStoppedPermille: Math.round(chanceOutBy(forecast, toEpochDays(end)) * 1000),
    inHindsight: true,
    promisedDays: promisedDays(catalogue, pack),
  };
}

/** Median life by the data sheet and the duty cycle alone, from the day the pack went in. */
function promisedDays(catalogue: ForecastCatalogue, pack: PackToForecast): number {
  const unread = { ...pack, lastHeardAt: null, measuredAverageUa: null };
  const input = forecastInputOf(catalogue, unread, [], [], null, pack.installedAt);
  return Math.max(1, forecastPack(input).quantiles.p50 - input.pack.installedAt);
}

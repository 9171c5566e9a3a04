import { z } from "zod";
import {
  loadDeviceEvents,
  loadForecastCatalogue,
  loadPacksToForecast,
  loadReadingsToForecast,
} from "@/db/queries/forecast-inputs";
import { type ForecastRow, installedPackPage, saveForecasts } from "@/db/queries/forecasts";
import { findOrganisation } from "@/db/queries/organisation";
import { type Forecast, forecastPack } from "@/lib/battery";
import { fromEpochDays } from "@/lib/units";
import {
  arrangeCatalogue,
  type ForecastCatalogue,
  forecastInputOf,
  groupBy,
} from "./forecast-input";
import { fleetPriors } from "./fleet-priors";
import { type Deps, defineUseCase } from "./use-case";
import { type WaitingPrices, waitingMinorPerWeek } from "./waiting-price";

/** Packs a batch: memory stays flat however large the fleet. */
const BATCH = 500;

/** Computes and stores the forecasts of these packs, or of every installed pack. */
export const refreshForecasts = defineUseCase({
  name: "refresh-forecasts",
  allow: { system: true },
  input: z.object({ packIds: z.array(z.uuid()).nullable() }),
  async run(deps, _actor, { packIds }): Promise<{ refreshed: number }> {
    const organisation = await findOrganisation(deps.db);
    if (!organisation) return { refreshed: 0 };
    const catalogue = arrangeCatalogue(await loadForecastCatalogue(deps.db));
    const terms = { catalogue, organisation };
    let refreshed = 0;
    for await (const page of packIds ? pagesOf(packIds) : installedPages(deps))
      refreshed += await refreshBatch(deps, terms, page);
    return { refreshed };
  },
});

function* pagesOf(packIds: readonly string[]): Generator<readonly string[]> {
  for (let from = 0; from < packIds.length; from += BATCH) yield packIds.slice(from, from + BATCH);
}

/** Every pack in service, page by page. */
export async function* installedPages({ db }: Pick<Deps, "db">): AsyncGenerator<readonly string[]> {
  let page = await installedPackPage(db, null, BATCH);
  while (page.length > 0) {
    yield page;
    page = await installedPackPage(db, page[page.length - 1] ?? null, BATCH);
  }
}

interface Terms {
  readonly catalogue: ForecastCatalogue;
  readonly organisation: WaitingPrices;
}

async function refreshBatch(
  deps: Deps,
  { catalogue, organisation }: Terms,
  packIds: readonly string[],
): Promise<number> {
  const knownAt = deps.now();
  const packs = await loadPacksToForecast(deps.db, packIds);
  if (packs.length === 0) return 0;
  const [readings, events] = await Promise.all([
    loadReadingsToForecast(deps.db, packIds),
    loadDeviceEvents(
      deps.db,
      packs.map((pack) => pack.assetId),
    ),
  ]);
  const readingsOf = groupBy(readings, (row) => row.packId);
  const eventsOf = groupBy(events, (row) => row.assetId);
  const priorOf = await fleetPriors(deps.db, catalogue, packs);
  const rows = packs.map((pack) => {
    const forecast = forecastPack(
      forecastInputOf(
        catalogue,
        pack,
        readingsOf.get(pack.packId) ?? [],
        eventsOf.get(pack.assetId) ?? [],
        priorOf(pack, eventsOf.get(pack.assetId) ?? []),
        knownAt,
      ),
    );
    const waiting = waitingMinorPerWeek(catalogue, organisation, pack, forecast, knownAt);
    return rowOf(pack.packId, forecast, waiting);
  });
  await saveForecasts(deps.db, rows, knownAt);
  return rows.length;
}

function rowOf(packId: string, forecast: Forecast, waiting: number): ForecastRow {
  const { quantiles: q, shareLeft } = forecast;
  return {
    packId,
    p05: fromEpochDays(q.p05),
    p20: fromEpochDays(q.p20),
    p50: fromEpochDays(q.p50),
    p80: fromEpochDays(q.p80),
    p95: fromEpochDays(q.p95),
    cdfDays: [...forecast.cdfDays],
    shareLeftPermille: permille(shareLeft.p50),
    shareLeftLowPermille: permille(shareLeft.p05),
    shareLeftHighPermille: permille(shareLeft.p95),
    drawUa: forecast.drawUa.p50,
    outNowPermille: permille(forecast.outNow),
    waitingCostMinorPerWeek: waiting,
    basis: { ...forecast.basis, drawUa: forecast.drawUa },
    weights: forecast.weights,
  };
}

function permille(share: number): number {
  return Math.round(share * 1000);
}

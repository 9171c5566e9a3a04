import {
  loadDeviceEvents,
  loadForecastCatalogue,
  loadPacksToForecast,
  loadReadingsToForecast,
  type PackToForecast,
} from "@/db/queries/forecast-inputs";
import { type Forecast, type ForecastInput, forecastPack } from "@/lib/battery";
import { arrangeCatalogue, type ForecastCatalogue, forecastInputOf } from "./forecast-input";
import { fleetPriors } from "./fleet-priors";
import type { Deps } from "./use-case";

/** One installed pack with its forecast, made now from all that is known. */
export interface PackForecast {
  readonly catalogue: ForecastCatalogue;
  readonly pack: PackToForecast;
  readonly input: ForecastInput;
  readonly forecast: Forecast;
}

/**
 * Forecasts one installed pack as the worker would, without keeping anything; null when it has
 * come out meanwhile.
 */
export async function packForecast(
  deps: Pick<Deps, "db" | "now">,
  packId: string,
): Promise<PackForecast | null> {
  const [rows, [pack], readings] = await Promise.all([
    loadForecastCatalogue(deps.db),
    loadPacksToForecast(deps.db, [packId]),
    loadReadingsToForecast(deps.db, [packId]),
  ]);
  if (!pack) return null;
  const catalogue = arrangeCatalogue(rows);
  const events = await loadDeviceEvents(deps.db, [pack.assetId]);
  const priorOf = await fleetPriors(deps.db, catalogue, [pack]);
  const input = forecastInputOf(
    catalogue,
    pack,
    readings,
    events,
    priorOf(pack, events),
    deps.now(),
  );
  return { catalogue, pack, input, forecast: forecastPack(input) };
}

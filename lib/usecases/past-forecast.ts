import {
  type DeviceEventRow,
  loadDeviceEvents,
  loadReadingsToForecast,
  type PackToForecast,
  type ReadingToForecast,
} from "@/db/queries/forecast-inputs";
import { type Forecast, forecastPack } from "@/lib/battery";
import type { PriorOf } from "./fleet-priors";
import { type ForecastCatalogue, forecastInputOf, groupBy } from "./forecast-input";
import type { Deps } from "./use-case";

/** All that was ever logged of some packs and their devices. */
export interface Logged {
  readings(pack: PackToForecast): readonly ReadingToForecast[];
  events(pack: PackToForecast): readonly DeviceEventRow[];
}

export async function loadLogged(deps: Deps, packs: readonly PackToForecast[]): Promise<Logged> {
  const packIds = packs.map((pack) => pack.packId);
  const assetIds = packs.map((pack) => pack.assetId);
  const [readings, events] = [
    groupBy(await loadReadingsToForecast(deps.db, packIds), (row) => row.packId),
    groupBy(await loadDeviceEvents(deps.db, assetIds), (row) => row.assetId),
  ];
  return {
    readings: (pack) => readings.get(pack.packId) ?? [],
    events: (pack) => events.get(pack.assetId) ?? [],
  };
}

/**
 * What the forecast of a pack would have said at a moment at which its device ran: nothing that
 * was read, measured or told later is in it, nor what packs that came out later taught.
 */
export function pastForecast(
  catalogue: ForecastCatalogue,
  pack: PackToForecast,
  logged: Logged,
  priorOf: PriorOf,
  at: Date,
): Forecast {
  const before = <Row extends { at: Date }>(rows: readonly Row[]) => rows.filter((r) => r.at < at);
  const events = before(logged.events(pack));
  const measured = pack.measuredAt !== null && pack.measuredAt < at;
  const known = {
    ...pack,
    measuredAverageUa: measured ? pack.measuredAverageUa : null,
    lastHeardAt: at,
  };
  const prior = priorOf(pack, events);
  const readings = before(logged.readings(pack));
  return forecastPack(forecastInputOf(catalogue, known, readings, events, prior, at));
}

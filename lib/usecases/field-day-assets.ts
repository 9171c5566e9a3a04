import type { FieldAssetRow } from "@/db/queries/field-day";
import type {
  DeviceEventRow,
  PackToForecast,
  ReadingToForecast,
} from "@/db/queries/forecast-inputs";
import type { DayAsset, DayForecast, DayPackInService } from "@/lib/sync/day-pack";
import { climateOf, type ForecastCatalogue, forecastInputOf } from "./forecast-input";

export interface PackParts {
  readonly catalogue: ForecastCatalogue;
  readonly packs: ReadonlyMap<string, PackToForecast>;
  readonly readings: ReadonlyMap<string, readonly ReadingToForecast[]>;
  readonly events: ReadonlyMap<string, readonly DeviceEventRow[]>;
  readonly now: Date;
}

/** Readings beyond these are history: the forecast at hand has them in it already. */
const READINGS_KEPT = 60;

/** The assets as the phone keeps them; what many share is kept once and pointed at. */
export function assembleAssets(rows: readonly FieldAssetRow[], parts: PackParts) {
  const climates: (readonly number[])[] = [];
  const places = new Map<string, number>();
  const climate = (id: string | null): number => {
    const known = places.get(id ?? "");
    if (known !== undefined) return known;
    places.set(id ?? "", climates.length);
    return climates.push(climateOf(parts.catalogue, id)) - 1;
  };
  const assets = rows.map((row): DayAsset => ({
    id: row.id,
    tag: row.tag,
    name: row.name,
    siteId: row.siteId,
    modelId: row.deviceModelId,
    state: row.state as DayAsset["state"],
    note: row.note,
    climate: climate(row.climateId),
    pack: packOf(row, parts),
  }));
  return { assets, climates };
}

function packOf(row: FieldAssetRow, parts: PackParts): DayPackInService | null {
  const known = row.packId ? parts.packs.get(row.packId) : undefined;
  if (!known) return null;
  const readings = parts.readings.get(known.packId) ?? [];
  const events = parts.events.get(row.id) ?? [];
  const input = forecastInputOf(parts.catalogue, known, readings, events, null, parts.now);
  return {
    id: known.packId,
    cellTypeId: known.cellTypeId,
    lotCode: row.lotCode,
    series: known.series,
    parallel: known.parallel,
    installedDay: input.pack.installedAt,
    madeDay: input.pack.madeAt,
    measuredDraw: input.pack.measuredDraw,
    readings: input.readings.slice(-READINGS_KEPT).map((reading) => ({
      id: reading.id,
      atDay: reading.at,
      millivolts: reading.millivolts,
      kind: reading.kind,
      loadUa: reading.loadUa,
      temperatureDc: reading.temperatureDc,
      accuracyMv: reading.accuracyMv,
    })),
    events: input.events.map(({ at, kind, lastAliveAt }) => ({
      atDay: at,
      kind,
      lastAliveDay: lastAliveAt ?? null,
    })),
    forecast: forecastOf(row),
  };
}

function forecastOf(row: FieldAssetRow): DayForecast | null {
  if (!row.computedAt || !row.p05 || !row.p50 || !row.p95) return null;
  return {
    computedAt: row.computedAt.toISOString(),
    stale: row.staleSince !== null,
    p05: row.p05.toISOString(),
    p50: row.p50.toISOString(),
    p95: row.p95.toISOString(),
    sharePermille: row.shareLeftPermille ?? 0,
    shareLowPermille: row.shareLeftLowPermille ?? 0,
    shareHighPermille: row.shareLeftHighPermille ?? 0,
    outNowPermille: row.outNowPermille ?? 0,
  };
}

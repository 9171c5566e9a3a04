/** One thread that reads and writes what the renewal does, and computes nothing. */
import { workerData } from "node:worker_threads";
import { connect } from "../../../db/client";
import {
  loadDeviceEvents,
  loadPacksToForecast,
  loadReadingsToForecast,
} from "../../../db/queries/forecast-inputs";
import { type ForecastRow, saveForecasts } from "../../../db/queries/forecasts";
import { answerPages } from "../../../lib/server/threads/answer-pages";
import { NOW } from "./fleet";

const db = connect((workerData as { url: string }).url, { max: 3 });

/** What a forecast's row looks like; only its size matters here. */
function rowLike(packId: string, readingIds: readonly string[]): ForecastRow {
  const [p05, p20, p50, p80, p95] = [10, 20, 30, 40, 50].map(
    (days) => new Date(NOW.getTime() + days * 86_400_000),
  ) as [Date, Date, Date, Date, Date];
  return {
    ...{ packId, p05, p20, p50, p80, p95 },
    cdfDays: Array.from({ length: 50 }, (_, k) => 20_800.123456 + k * 7.654321),
    ...{ shareLeftPermille: 500, shareLeftLowPermille: 400, shareLeftHighPermille: 600 },
    ...{ drawUa: 123.456789, outNowPermille: 12, waitingCostMinorPerWeek: 1234 },
    basis: { restingReadings: 14, loadedReadings: 6, doubtfulReadings: 0, measuredDraw: false },
    weights: readingIds.map((readingId) => ({
      readingId,
      weight: 0.987654321,
      expectedMv: 3123.456789,
      expectedLowMv: 3012.345678,
      expectedHighMv: 3234.567891,
      reason: "fits",
    })),
  };
}

async function readAndWrite(packIds: readonly string[]): Promise<number> {
  const packs = await loadPacksToForecast(db, packIds);
  const assetIds = packs.map((pack) => pack.assetId);
  const [readings] = await Promise.all([
    loadReadingsToForecast(db, packIds),
    loadDeviceEvents(db, assetIds),
  ]);
  const idsOf = new Map<string, string[]>(packIds.map((id) => [id, []]));
  for (const reading of readings) idsOf.get(reading.packId)?.push(reading.id);
  const rows = packs.map(({ packId }) => rowLike(packId, idsOf.get(packId) ?? []));
  await saveForecasts(db, rows, NOW);
  return rows.length;
}

answerPages(readAndWrite);

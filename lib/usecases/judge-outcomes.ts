import { loadPacksToForecast, type PackToForecast } from "@/db/queries/forecast-inputs";
import {
  insertOutcomes,
  keepPromises,
  type OutcomeRow,
  type PackPromise,
  unjudgedPacks,
} from "@/db/queries/outcomes";
import { chanceOutBy, forecastPack } from "@/lib/battery";
import { fromEpochDays, MS_PER_DAY, toEpochDays } from "@/lib/units";
import { type ForecastCatalogue, forecastInputOf, withoutFindings } from "./forecast-input";
import type { JudgingGround } from "./lessons-by-quarter";
import { loadLogged, type Logged, pastForecast } from "./past-forecast";
import type { Deps } from "./use-case";

const BATCH = 500;

/** Voltages taken this shortly before the removal belong to the same visit. */
const SAME_VISIT_MS = MS_PER_DAY / 2;

/**
 * Keeps an outcome of every pack that came out without one, with the forecast of the last visit
 * before; and beside every outcome what the data sheet alone had promised.
 * @returns how many packs were new to it
 */
export async function judgeOutcomes(deps: Deps, ground: JudgingGround): Promise<number> {
  for (let judged = 0; ;) {
    const found = await unjudgedPacks(deps.db, BATCH);
    if (found.length === 0) return judged;
    const packIds = found.map(({ id }) => id);
    const packs = await loadPacksToForecast(deps.db, packIds, "removed");
    const kept = new Set(found.filter((pack) => pack.kept).map(({ id }) => id));
    const promises = packs.map((pack) => promiseOf(ground.catalogue, pack));
    const unkept = packs.filter((pack) => !kept.has(pack.packId));
    await insertOutcomes(deps.db, await outcomesOf(deps, ground, unkept));
    await keepPromises(deps.db, promises);
    judged += found.length;
  }
}

async function outcomesOf(
  deps: Deps,
  ground: JudgingGround,
  packs: readonly PackToForecast[],
): Promise<OutcomeRow[]> {
  if (packs.length === 0) return [];
  const logged = await loadLogged(deps, packs);
  const rows: OutcomeRow[] = [];
  for (const pack of packs) rows.push(await outcomeOf(ground, pack, logged, deps.now()));
  return rows;
}

/**
 * The forecast is that of the last visit before. A later moment would not do: many a removal
 * comes because the device fell silent, and a forecast made on the eve of such a visit would be
 * one chosen by its outcome.
 */
async function outcomeOf(
  { catalogue, lessonAt }: JudgingGround,
  pack: PackToForecast,
  logged: Logged,
  recordedAt: Date,
): Promise<OutcomeRow> {
  const removedAt = pack.removedAt ?? recordedAt;
  const end = pack.stoppedAt ?? removedAt;
  const until = Math.min(end.getTime(), removedAt.getTime() - SAME_VISIT_MS);
  const visits = logged.readings(pack).filter((row) => row.at.getTime() < until);
  // a voltage is known the moment after it was read
  const at = new Date((visits.at(-1)?.at ?? pack.installedAt).getTime() + 1);
  const forecast = pastForecast(catalogue, pack, logged, await lessonAt(at), at);
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
  };
}

/** Median life by the data sheet and the duty cycle alone, from the day the pack went in. */
function promiseOf(catalogue: ForecastCatalogue, pack: PackToForecast): PackPromise {
  const unread = { ...pack, lastHeardAt: null, measuredAverageUa: null };
  const sheets = withoutFindings(catalogue);
  const input = forecastInputOf(sheets, unread, [], [], null, pack.installedAt);
  const days = forecastPack(input).quantiles.p50 - input.pack.installedAt;
  return { packId: pack.packId, promisedDays: Math.max(1, days) };
}

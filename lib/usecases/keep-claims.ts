import {
  type ClaimRow,
  countUnclaimed,
  type QuarterStart,
  saveClaims,
  unclaimedPackPage,
} from "@/db/queries/forecast-claims";
import { loadPacksToForecast } from "@/db/queries/forecast-inputs";
import { MS_PER_DAY } from "@/lib/units";
import type { JudgingGround } from "./lessons-by-quarter";
import { loadLogged, pastForecast } from "./past-forecast";
import { quartersBetween } from "./quarters";
import type { Deps } from "./use-case";

const BATCH = 500;

/** As far back as the Record looks. */
export const LOOKED_BACK_DAYS = 1100;

/**
 * Keeps what was said of each pack in service at the start of each quarter, where it is not kept
 * yet: of the quarter that has just begun, and of past ones after an import.
 * @returns how many were kept
 */
export async function keepClaims(deps: Deps, ground: JudgingGround): Promise<number> {
  const now = deps.now();
  const since = new Date(now.getTime() - LOOKED_BACK_DAYS * MS_PER_DAY);
  const quarters = quartersBetween(since, now, ground.timeZone);
  const missing = await countUnclaimed(deps.db, quarters);
  let kept = 0;
  for (const quarter of quarters) {
    if (missing.has(quarter.day)) kept += await keepQuarter(deps, ground, quarter);
  }
  return kept;
}

async function keepQuarter(
  deps: Deps,
  ground: JudgingGround,
  quarter: QuarterStart,
): Promise<number> {
  let kept = 0;
  for (let after: string | null = null; ;) {
    const packIds = await unclaimedPackPage(deps.db, quarter, after, BATCH);
    after = packIds.at(-1) ?? null;
    if (after === null) return kept;
    await saveClaims(deps.db, await claimsOf(deps, ground, quarter, packIds));
    kept += packIds.length;
  }
}

async function claimsOf(
  deps: Deps,
  { catalogue, lessonAt }: JudgingGround,
  quarter: QuarterStart,
  packIds: readonly string[],
): Promise<ClaimRow[]> {
  const packs = [
    ...(await loadPacksToForecast(deps.db, packIds)),
    ...(await loadPacksToForecast(deps.db, packIds, "removed")),
  ];
  const logged = await loadLogged(deps, packs);
  const priorOf = await lessonAt(quarter.at);
  return packs.map((pack) => {
    const said = pastForecast(catalogue, pack, logged, priorOf, quarter.at);
    const cdfDays = [...said.cdfDays];
    const kept = { madeAt: quarter.at, keptAt: deps.now(), cdfDays };
    return { ...kept, packId: pack.packId, quarter: quarter.day };
  });
}

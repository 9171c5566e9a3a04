/**
 * How forecasts are held against what came of them: of each finished pack the forecasts that
 * would have been made at some of its readings are scored by the probability they gave to all
 * days up to the one it stopped on. Those should be even between 0 and 1; where their normal
 * scores lie too far out or too close in, later windows are made wider or narrower by as much.
 * Source: Gneiting, Balabdaoui & Raftery, JRSS B 69, 2007 (calibration by the probability
 * integral transform).
 */
import { normalQuantile } from "../stats/normal";
import { forecastPack } from "./forecast";
import { chanceOutBy } from "./forecast";
import type { Calibration, FleetPrior, PackReading, PackSpec } from "./pack";

/** Where in a pack's readings its forecasts are judged, as shares of their number. */
const JUDGED_AT = [0.2, 0.4, 0.6, 0.8] as const;
/** No window is scaled on fewer than this many packs' word alone. */
const OWN_WEIGHT = 6;
/** A common shift is half believed: the next packs meet other winters than the last ones did. */
const SHIFT_SHARE = 0.5;
/**
 * How far narrowing is believed, as a power: packs are judged under their cohort's prior, wider
 * than the one of a device with a history of its own, and short lives with few readings hang on
 * that. Half up to a year's life, the whole from two years on.
 */
const narrowing = (years: number): number => Math.min(1, Math.max(0.5, years / 2));
/** A perfect forecaster's scores lie within this of 0 four times in five. */
const Z80 = 1.2815515655446004;
const LEAST_CHANCE = 0.002;
const NARROWEST = 0.6;
const WIDEST = 3;

export interface JudgedPack {
  readonly pack: PackSpec;
  readonly readings: readonly PackReading[];
  readonly outAt: number;
  readonly prior: FleetPrior;
}

/** Normal scores of one pack's end under its own forecasts. */
export function endScores({ pack, readings, outAt, prior }: JudgedPack): number[] {
  const known = readings.filter((r) => r.at > pack.installedAt && r.at < outAt);
  const places = new Set(JUDGED_AT.map((share) => Math.floor(share * known.length)));
  return [...places].flatMap((k) => {
    const now = known[k]?.at;
    if (now === undefined) return [];
    const events = [{ kind: "reporting" as const, at: now }];
    const said = forecastPack({ pack, readings: known.slice(0, k + 1), events, prior, now });
    const chance = chanceOutBy(said, outAt);
    return [normalQuantile(Math.min(1 - LEAST_CHANCE, Math.max(LEAST_CHANCE, chance)))];
  });
}

/**
 * Shift and spread of the scores of many packs, drawn towards 0 and 1 where they are few;
 * `years` is their mean life.
 */
export function calibrate(scores: readonly (readonly number[])[], years: number): Calibration {
  const packs = scores.filter((s) => s.length > 0);
  const all = packs.flat().sort((a, b) => a - b);
  const own = packs.length / (packs.length + OWN_WEIGHT);
  const shift = SHIFT_SHARE * own * (all[all.length >> 1] ?? 0);
  const away = all.map((z) => Math.abs(z - shift)).sort((a, b) => a - b);
  const found = (away[Math.floor(0.8 * away.length)] ?? Z80) / Z80;
  const ratio = found < 1 ? found ** narrowing(years) : found;
  const spread = Math.exp(own * Math.log(Math.max(0.2, ratio)));
  return { shift, spread: Math.min(WIDEST, Math.max(NARROWEST, spread)) };
}

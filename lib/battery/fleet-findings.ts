/**
 * Findings about the fleet, each with the packs concerned: lots that die early, and models
 * whose draw shifted on a day (a firmware update, say).
 */
import { fitAcceleratedLife } from "../stats/accelerated-life";
import { normalCdf } from "../stats/normal";
import { logRank } from "../stats/survival";
import type { EpochDays } from "../units";
import type { FinishedPack } from "./fleet-prior";

/** False alarms wanted in all tests of one kind together. */
const ALARM = 0.01;
const LEAST_ENDED = 3;
const LEAST_SIDE = 4;
/** Shifts below this are not worth a visit, ln(draw). */
const LEAST_SHIFT = Math.log(1.1);

export interface BadLot {
  readonly kind: "bad-lot";
  readonly lot: string;
  /** Life of its packs relative to the others', and the chance of so clear a gap by luck. */
  readonly lifeFactor: number;
  readonly chance: number;
  readonly packKeys: readonly string[];
}

/** Two-sided chance of a chi-squared (1 degree) this large. */
function chanceOf(chiSquared: number): number {
  return 2 * normalCdf(-Math.sqrt(chiSquared));
}

/**
 * Lots whose packs lived shorter than the rest by a log-rank test on life ratios, at a 1 %
 * chance of any false alarm (Bonferroni), with at least three packs run out.
 */
export function badLots(finished: readonly FinishedPack[]): BadLot[] {
  const lots = new Map<string, FinishedPack[]>();
  for (const pack of finished) {
    if (pack.lot === null || !(pack.lifeRatio > 0)) continue;
    lots.set(pack.lot, [...(lots.get(pack.lot) ?? []), pack]);
  }
  const life = (p: FinishedPack) => ({ time: p.lifeRatio, ended: p.ranOut });
  const findings: BadLot[] = [];
  for (const [lot, packs] of lots) {
    const rest = finished.filter((p) => p.lot !== lot && p.lifeRatio > 0);
    if (packs.filter((p) => p.ranOut).length < LEAST_ENDED || rest.length < LEAST_ENDED) continue;
    const { chiSquared, observed, expected } = logRank(packs.map(life), rest.map(life));
    const chance = chanceOf(chiSquared);
    if (observed[0] <= expected[0] || chance > ALARM / lots.size) continue;
    const fit = fitAcceleratedLife(
      [...packs.map((p) => ({ ...life(p), x: [1] })), ...rest.map((p) => ({ ...life(p), x: [0] }))],
      "log-normal",
    );
    const lifeFactor = Math.exp(fit?.coefficients[1] ?? 0);
    findings.push({
      kind: "bad-lot",
      lot,
      lifeFactor,
      chance,
      packKeys: packs.map((p) => p.packKey),
    });
  }
  return findings.sort((a, b) => a.chance - b.chance);
}

/** What one pack's readings say of its device's draw over a stretch of time. */
export interface DrawObservation {
  readonly packKey: string;
  readonly model: string;
  readonly at: EpochDays;
  /** ln(draw / sheet) and its standard deviation. */
  readonly lnFactor: number;
  readonly sd: number;
}

export interface DrawShift {
  readonly kind: "draw-shift";
  readonly model: string;
  /** First observation after the shift. */
  readonly at: EpochDays;
  /** Draw after over draw before. */
  readonly factor: number;
  /** How well the models' mean factor is known, one standard deviation, as a share. */
  readonly relativeSd: number;
  readonly chance: number;
  /** Packs observed after it. */
  readonly packKeys: readonly string[];
}

/**
 * The clearest step in each model's draw: at every day the weighted means before and after
 * are compared; the best split is told when its chance, corrected for all splits and models,
 * is below 1 % and the step exceeds 10 %. Scatter beyond the stated errors widens them.
 */
export function drawShifts(observations: readonly DrawObservation[]): DrawShift[] {
  const models = new Map<string, DrawObservation[]>();
  for (const o of observations) models.set(o.model, [...(models.get(o.model) ?? []), o]);
  return [...models]
    .flatMap(([model, own]) => clearestStep(model, own, models.size) ?? [])
    .sort((a, b) => a.chance - b.chance);
}

interface Side {
  readonly mean: number;
  readonly variance: number;
  readonly packs: readonly string[];
}

function clearestStep(
  model: string,
  own: readonly DrawObservation[],
  models: number,
): DrawShift | null {
  const sorted = [...own].sort((a, b) => a.at - b.at);
  let best: DrawShift | null = null;
  for (let k = 1; k < sorted.length; k++) {
    if (sorted[k]!.at === sorted[k - 1]!.at) continue;
    const before = side(sorted.slice(0, k));
    const after = side(sorted.slice(k));
    if (before.packs.length < LEAST_SIDE || after.packs.length < LEAST_SIDE) continue;
    const step = after.mean - before.mean;
    const chance =
      chanceOf(step ** 2 / (before.variance + after.variance)) * sorted.length * models;
    if (Math.abs(step) < LEAST_SHIFT || chance > ALARM || (best && chance >= best.chance)) continue;
    best = {
      kind: "draw-shift",
      model,
      at: sorted[k]!.at,
      factor: Math.exp(step),
      relativeSd: Math.sqrt(before.variance + after.variance),
      chance: Math.min(1, chance),
      packKeys: after.packs,
    };
  }
  return best;
}

function side(observations: readonly DrawObservation[]): Side {
  let sum = 0;
  let total = 0;
  for (const { lnFactor, sd } of observations) {
    total += 1 / sd ** 2;
    sum += lnFactor / sd ** 2;
  }
  const mean = sum / total;
  const chi = observations.reduce((s, o) => s + ((o.lnFactor - mean) / o.sd) ** 2, 0);
  const excess = Math.max(1, chi / Math.max(1, observations.length - 1));
  return {
    mean,
    variance: excess / total,
    packs: [...new Set(observations.map((o) => o.packKey))],
  };
}

/**
 * Reliability of stated chances: events are put in bins by the chance that was stated, and
 * the share that came true is laid beside the mean chance, with Wilson's interval.
 * Source: Murphy & Winkler, "Reliability of subjective probability forecasts", Applied
 * Statistics 26 (1977) 41-47 (from memory); interval: Wilson, JASA 22 (1927) 209-212.
 */
import { wilson } from "./coverage";

export interface StatedChance {
  /** 0..1 */
  readonly chance: number;
  readonly cameTrue: boolean;
}

export interface ReliabilityBin {
  readonly forecast: number;
  readonly observed: number;
  /** 90 % interval of the observed share. */
  readonly low: number;
  readonly high: number;
  readonly count: number;
}

/**
 * @param edges ascending, from 0 to 1; a chance on an edge falls in the bin that starts there
 * @returns the bins that hold anything, by rising chance
 */
export function reliabilityBins(
  stated: readonly StatedChance[],
  edges: readonly number[] = [0, 0.02, 0.05, 0.1, 0.2, 0.35, 0.5, 0.65, 0.8, 0.9, 1],
): ReliabilityBin[] {
  const bins: ReliabilityBin[] = [];
  for (let i = 0; i + 1 < edges.length; i++) {
    const from = edges[i] ?? 0;
    const until = edges[i + 1] ?? 1;
    const last = i + 2 === edges.length;
    const held = stated.filter((s) => s.chance >= from && (s.chance < until || last));
    if (held.length === 0) continue;
    const hits = held.filter((s) => s.cameTrue).length;
    const [low, high] = wilson(hits, held.length, 0.9);
    bins.push({
      forecast: held.reduce((sum, s) => sum + s.chance, 0) / held.length,
      observed: hits / held.length,
      low,
      high,
      count: held.length,
    });
  }
  return bins;
}

/**
 * Brier score: mean squared difference between stated chance and outcome (0 best, 1 worst).
 * Source: Brier, Monthly Weather Review 78 (1950) 1-3.
 */
export function brierScore(stated: readonly StatedChance[]): number {
  const total = stated.reduce((sum, s) => sum + (s.chance - (s.cameTrue ? 1 : 0)) ** 2, 0);
  return total / stated.length;
}

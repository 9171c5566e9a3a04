/**
 * The forecast and three simpler ways of the trade, each as a function from what is known at
 * a visit to a distribution (50 equal-weight days) and a share left. The simple ways state no
 * spread of their own; each is given a round one that was not tuned: 20 % of the life for the
 * sheet alone, 25 % of the time left for the other two. Their coverage hangs on it.
 */
import { CDF_PROBABILITIES, forecastPack, packEndDepth } from "../../../lib/battery";
import { fullCapacity } from "../../../lib/battery/pack-model";
import { packCurve, packMv } from "../../../lib/battery/cutoff";
import { packAverageUa, packPeakUa } from "../../../lib/battery/duty";
import type { FleetPrior, PackReading, PackSpec } from "../../../lib/battery/pack";
import { normalQuantile } from "../../../lib/stats/normal";

export interface Known {
  readonly spec: PackSpec;
  readonly readings: readonly PackReading[];
  /** Last day on which the device was seen to run. */
  readonly aliveAt: number;
  readonly now: number;
  readonly prior: FleetPrior | null;
}

export interface Stated {
  readonly days: readonly number[];
  readonly shareLeft: number;
}

export type Method = (known: Known) => Stated;

const withPrior =
  (use: boolean): Method =>
  ({ spec, readings, aliveAt, now, prior }) => {
    const f = forecastPack({
      pack: spec,
      readings,
      events: [{ kind: "reporting", at: aliveAt }],
      prior: use ? prior : null,
      now,
    });
    return { days: f.cdfDays, shareLeft: f.shareLeft.p50 };
  };

/** A point and a spread as a distribution that ends no earlier than the device was seen. */
function around(end: number, sd: number, known: Known, shareLeft: number): Stated {
  const days = CDF_PROBABILITIES.map((p) =>
    Math.max(known.aliveAt, end + Math.max(1, sd) * normalQuantile(p)),
  );
  return { days, shareLeft: Math.min(1, Math.max(0, shareLeft)) };
}

function lifeBySheet(spec: PackSpec): number {
  const capacityMah = spec.cell.rated.capacityMah * spec.parallel;
  return (capacityMah * 1000) / Math.max(packAverageUa(spec), 1e-6) / 24;
}

/** Rated capacity over average draw. */
const nameplate: Method = (known) => {
  const life = lifeBySheet(known.spec);
  const left = 1 - (known.now - known.spec.installedAt) / life;
  return around(known.spec.installedAt + life, 0.2 * life, known, left);
};

const resting = (known: Known): PackReading[] =>
  known.readings.filter((r) => r.kind === "resting" && r.at <= known.now);

/** The last resting voltage looked up on the curve; the time it took gives the rate. */
const lookUp: Method = (known) => {
  const last = resting(known).at(-1);
  if (!last) return nameplate(known);
  const { spec } = known;
  const curve = packCurve(spec);
  let depth = 0;
  while (depth < 1 && packMv(spec, curve, depth, 0, 200) > last.millivolts) depth += 0.002;
  const end = packEndDepth(spec, packPeakUa(spec), 100);
  const elapsed = last.at - spec.installedAt;
  const fastest = (packAverageUa(spec) * 0.024) / fullCapacity(spec, packAverageUa(spec)) / 4;
  const rate = Math.max(depth / elapsed, fastest);
  const stop = last.at + Math.max(0, end - depth) / rate;
  return around(stop, 0.25 * Math.max(0, stop - known.now), known, 1 - depth / Math.max(end, 0.01));
};

/** Least squares through the resting voltages down to the cut-off. */
const straightLine: Method = (known) => {
  const points = resting(known);
  if (points.length < 3) return nameplate(known);
  const { spec } = known;
  const t = points.map((r) => r.at - spec.installedAt);
  const v = points.map((r) => r.millivolts);
  const mean = (xs: number[]): number => xs.reduce((a, b) => a + b, 0) / xs.length;
  const [mt, mv] = [mean(t), mean(v)];
  const sxy = t.reduce((s, x, i) => s + (x - mt) * (v[i]! - mv), 0);
  const slope = sxy / t.reduce((s, x) => s + (x - mt) ** 2, 0);
  if (!(slope < 0)) return nameplate(known);
  const life = Math.min(mt + (spec.cutoffMv - mv) / slope, 20 * 365);
  const stop = spec.installedAt + life;
  const left = 1 - (known.now - spec.installedAt) / Math.max(life, 1);
  return around(stop, 0.25 * Math.max(0, stop - known.now), known, left);
};

export const METHODS: Readonly<Record<string, Method>> = {
  filter: withPrior(false),
  "filter + fleet": withPrior(true),
  nameplate,
  "voltage look-up": lookUp,
  "straight line": straightLine,
};

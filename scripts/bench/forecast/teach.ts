/**
 * What the fleet knows before the scored packs: every device's first pack, run to its end or
 * (every third) swapped early, taught by the product's own learning.
 */
import {
  cohortPrior,
  devicePrior,
  expectedRatio,
  type FinishedPack,
  forecastPack,
  learnCohorts,
  learnCurves,
} from "../../../lib/battery";
import type { FleetPrior } from "../../../lib/battery";
import type { Trial } from "./score";
import type { TrialDevice } from "./trial";

/** Early swaps come out at this share of their life. */
const EARLY = 0.7;

function finished(device: TrialDevice, index: number): FinishedPack {
  const pack = device.packs[0]!;
  const { spec } = pack;
  const at = { pack: spec, readings: [], events: [], prior: null, now: spec.installedAt };
  const promised = forecastPack(at).quantiles.p50 - spec.installedAt;
  const ranOut = index % 3 !== 0;
  const life = (pack.end - spec.installedAt) * (ranOut ? 1 : EARLY);
  return {
    packKey: `${device.key}/0`,
    deviceKey: device.key,
    cohort: device.cohort,
    lot: null,
    lifeRatio: life / Math.max(promised, 1),
    ranOut,
  };
}

/** What the readings of a pack swapped early promised of its life when it came out. */
function promise(device: TrialDevice, own: FinishedPack, prior: FleetPrior): FinishedPack {
  const { spec, readings, end } = device.packs[0]!;
  const now = spec.installedAt + (end - spec.installedAt) * EARLY;
  const seen = readings.filter((r) => r.at <= now);
  const events = [{ kind: "reporting" as const, at: now }];
  const expected = expectedRatio({ pack: spec, readings: seen, events, prior, now });
  return { ...own, expected };
}

/** Second packs with what the first ones taught. */
export function taughtTrials(devices: readonly TrialDevice[]): Trial[] {
  const past = devices.map(finished);
  const curves = learnCurves(
    devices.flatMap((device, i) => {
      const { spec, readings, end } = device.packs[0]!;
      const history = { cohort: device.cohort, pack: spec, readings, stoppedAt: end };
      return past[i]!.ranOut ? [history] : [];
    }),
  );
  const cohorts = new Map(learnCohorts(past).map((life) => [life.cohort, life]));
  return devices.map((device, i) => {
    const life = cohorts.get(device.cohort);
    if (!life) return { pack: device.packs[1]!, prior: null };
    const curve = curves.get(device.cohort) ?? null;
    const shared = { ...cohortPrior(life), curve };
    const own = past[i]!.ranOut ? past[i]! : promise(device, past[i]!, shared);
    return { pack: device.packs[1]!, prior: { ...devicePrior(life, [own]), curve } };
  });
}

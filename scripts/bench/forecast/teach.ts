/**
 * What the fleet knows before the scored packs: every device's first pack, run to its end or
 * (every third) swapped early, taught by the product's own learning.
 */
import { learnFleet } from "../../../lib/battery";
import type { Trial } from "./score";
import type { TrialDevice } from "./trial";

/** Early swaps come out at this share of their life. */
const EARLY = 0.7;

/** Second packs with what the first ones taught. */
export function taughtTrials(devices: readonly TrialDevice[]): Trial[] {
  const lesson = learnFleet(
    devices.map((device, index) => {
      const { spec, readings, end } = device.packs[0]!;
      const ranOut = index % 3 !== 0;
      const outAt = ranOut ? end : spec.installedAt + (end - spec.installedAt) * EARLY;
      return {
        packKey: `${device.key}/0`,
        deviceKey: device.key,
        cohort: device.cohort,
        lot: null,
        pack: spec,
        readings: readings.filter((r) => r.at <= outAt),
        outAt,
        ranOut,
      };
    }),
  );
  return devices.map(({ key, cohort, chemistry, packs }) => ({
    pack: packs[1]!,
    prior: lesson.priorFor({ deviceKey: key, cohort, chemistry }),
  }));
}

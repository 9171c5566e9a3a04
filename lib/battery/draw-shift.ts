/**
 * A shift of a model's draw that the fleet's readings showed (`fleet-findings.ts`), brought to
 * bear on the packs concerned: from that day on their draw is taken to be higher or lower by the
 * factor found, give or take how well it is known, and their own readings move it on from there.
 */
import type { EpochDays } from "../units";
import { ASSUMED } from "./assumptions";
import type { DrawShift } from "./fleet-findings";
import type { Grid } from "./grid";
import type { ForecastInput, FoundDrawShift } from "./pack";

/** A registered change up to so long before a found shift is its cause, days. */
const CAUSED_WITHIN_DAYS = 200;
/** Nodes and weights of a 5-point normal: Gauss-Hermite, moments 0 to 9 exact. */
const NORMAL_Z = [-2.8569700138728, -1.3556261799742, 0, 1.3556261799742, 2.8569700138728];
const NORMAL_W = [
  0.01125741132772, 0.22207592200561, 0.53333333333334, 0.22207592200561, 0.01125741132772,
];

/**
 * A pack's input with a shift found for its model. A draw measured on site since then tells the
 * draw as it is now: nothing is added. A registered change of the device shortly before the shift
 * is taken for its cause, and the shift counted from there; a pack put in since starts with it.
 * @param measuredAt when the input's measured draw was taken; null: there is none
 */
export function withDrawShift(
  input: ForecastInput,
  shift: Pick<DrawShift, "at" | "factor" | "relativeSd">,
  measuredAt: EpochDays | null = null,
): ForecastInput {
  if (input.pack.measuredDraw && measuredAt !== null && measuredAt >= shift.at) return input;
  const causes = input.events
    .filter((e) => e.kind === "draw-changed")
    .filter((e) => e.at <= shift.at && e.at > shift.at - CAUSED_WITHIN_DAYS);
  const began = causes.reduce((latest, e) => Math.max(latest, e.at), -Infinity);
  const found: FoundDrawShift = {
    at: began > -Infinity ? began : shift.at,
    factor: shift.factor,
    relativeSd: Math.hypot(shift.relativeSd, ASSUMED.deviceShiftSd),
  };
  return { ...input, drawShifts: [...(input.drawShifts ?? []), found] };
}

/** How much further the rates must reach for some shifts, as a spread of ln(rate). */
export function shiftReach(shifts: readonly FoundDrawShift[]): number {
  return shifts.reduce((sum, s) => sum + Math.abs(Math.log(s.factor)) / 3 + s.relativeSd, 0);
}

/** Move every rate by a factor known to `relativeSd`; the ends of the axis hold what lies beyond. */
export function shiftRates(grid: Grid, { factor, relativeSd }: FoundDrawShift): void {
  const { nx, nr, no, p, spare, rateStep } = grid;
  spare.fill(0);
  for (let row = 0; row < no * nr; row++) {
    const first = Math.floor(row / nr) * nr;
    NORMAL_Z.forEach((z, n) => {
      const by = (Math.log(factor) + z * relativeSd) / rateStep;
      const place = Math.min(nr - 1, Math.max(0, (row % nr) + by));
      const low = Math.min(nr - 2, Math.floor(place));
      const weight = NORMAL_W[n]!;
      const to = (first + low) * nx;
      for (let i = 0; i < nx; i++) {
        const mass = p[row * nx + i]! * weight;
        const part = mass * (place - low);
        spare[to + i]! += mass - part;
        spare[to + nx + i]! += part;
      }
    });
  }
  grid.spare = p;
  grid.p = spare;
  grid.rowMass.fill(1);
}

import { z } from "zod";
import { findAsset } from "@/db/queries/assets";
import { listDrawMeasurements } from "@/db/queries/draw-measurements";
import { findInstalledPack } from "@/db/queries/packs";
import { notFound } from "@/lib/errors";
import { coldSnap, expectedVoltage } from "@/lib/battery";
import { type Evidence, lastMoved, movedByReading } from "@/lib/battery/evidence";
import { fromEpochDays, toEpochDays } from "@/lib/units";
import { packForecast, type PackForecast } from "./pack-forecast";
import { defineUseCase } from "./use-case";

/** Points of the expected voltage from the installation to the end of the window. */
const BAND_POINTS = 48;
/** Readings whose own move is worked out: each takes a forecast of its own. */
const MOVES_SHOWN = 24;

/** Why a pack's forecast says what it says: what moved it, what to expect, a cold stop. */
export const explainForecast = defineUseCase({
  name: "explain-forecast",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ tag: z.string().min(1) }),
  async run(deps, _actor, { tag }) {
    const asset = await findAsset(deps.db, tag);
    if (!asset) throw notFound(`The asset ${tag}`);
    const installed = await findInstalledPack(deps.db, asset.id);
    const made = installed && (await packForecast(deps, installed.id));
    if (!made) return null;
    const [measured] = await listDrawMeasurements(deps.db, asset.id);
    const { input, forecast } = made;
    const recent = input.readings.slice(-MOVES_SHOWN).map((r) => r.id);
    const snap = forecast.outNow < 0.5 ? coldSnap(input) : null;
    return {
      moved: movedOf(made, measured?.at ?? null),
      movedByReading: Object.fromEntries(movedByReading(input, forecast, recent)),
      coldSnap: snap && {
        stopsAt: fromEpochDays(snap.stopsAt),
        returnsAt: fromEpochDays(snap.returnsAt),
        endsAt: fromEpochDays(snap.endsAt),
      },
      expected: expectedAtRest(made),
    };
  },
});
export type Explanation = NonNullable<Awaited<ReturnType<typeof explainForecast>>>;

function movedOf({ input, forecast }: PackForecast, measuredAt: Date | null) {
  const moved = lastMoved(input, forecast, measuredAt && toEpochDays(measuredAt));
  return (
    moved && {
      ...saidOf(moved.evidence),
      at: fromEpochDays(moved.evidence.at),
      likely: fromEpochDays(moved.likely),
      without: fromEpochDays(moved.without),
      days: moved.days,
    }
  );
}

function saidOf(evidence: Evidence) {
  if (evidence.kind !== "reading") {
    const stopped = evidence.kind === "event" && evidence.event.kind === "stopped";
    return { kind: stopped ? ("stopped" as const) : evidence.kind, reading: null };
  }
  const { millivolts, kind } = evidence.reading;
  return { kind: evidence.kind, reading: { millivolts, kind } };
}

/** Resting voltage to be expected by all that is known now, back to the first day and ahead. */
function expectedAtRest({ input, forecast }: PackForecast) {
  const from = input.pack.installedAt;
  const to = Math.max(input.now, forecast.quantiles.p80);
  const dates = Array.from(
    { length: BAND_POINTS },
    (_, i) => from + ((to - from) * i) / (BAND_POINTS - 1),
  );
  const query = { kind: "resting", loadUa: null, temperatureDc: null } as const;
  return expectedVoltage(input, dates, query).map(({ at, ...mv }) => ({
    at: fromEpochDays(at),
    ...mv,
  }));
}

import { z } from "zod";
import { findAsset } from "@/db/queries/assets";
import { listAcceptedCellTypes } from "@/db/queries/device-models";
import { findInstalledPack } from "@/db/queries/packs";
import { invalid, notFound } from "@/lib/errors";
import {
  type DutyState,
  type Forecast,
  type ForecastInput,
  forecastPack,
  type PackSpec,
} from "@/lib/battery";
import { changedDuty, forecastAfterChange, withDuty } from "@/lib/planning/changed-duty";
import { fromEpochDays } from "@/lib/units";
import { optionalId, optionalScaledEntry } from "./form-entries";
import { judgeReading } from "./judge-reading";
import { packForecast, type PackForecast } from "./pack-forecast";
import { MAX_PACK_MV } from "./record-reading";
import { defineUseCase } from "./use-case";

/** Half the ln-width of a 90 % interval to one standard deviation. */
const Z90 = 1.6448536269514722;

const input = z.object({
  tag: z.string().min(1),
  volts: optionalScaledEntry(3, {
    min: 0,
    max: MAX_PACK_MV,
    wanted: "a voltage in V, such as 3.48, or leave it empty",
  }),
  kind: z.enum(["resting", "loaded"], "Choose resting or under load.").default("resting"),
  periodMinutes: optionalScaledEntry(2, {
    min: 1,
    max: 20_000_000,
    wanted: "the time from one sample to the next in minutes, or leave it empty",
  }),
  stateName: z.string().max(100).default(""),
  stateMilliamps: optionalScaledEntry(3, {
    min: 0,
    max: 100_000_000,
    wanted: "the current of that state in mA, or leave it empty",
  }),
  cellTypeId: optionalId,
});
type Given = z.output<typeof input>;

/**
 * The forecast of an installed pack as it stands and as it would be if a voltage were read now,
 * the device worked otherwise, or the pack were of other cells. Keeps nothing.
 */
export const forecastWhatIf = defineUseCase({
  name: "forecast-what-if",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input,
  async run(deps, _actor, given) {
    const asset = await findAsset(deps.db, given.tag);
    if (!asset) throw notFound(`The asset ${given.tag}`);
    const installed = await findInstalledPack(deps.db, asset.id);
    const made = installed && (await packForecast(deps, installed.id));
    if (!made) throw notFound(`A pack in ${given.tag}`);
    refuseNothing(given);
    const accepted = await listAcceptedCellTypes(deps.db, asset.deviceModelId);
    const cell = accepted.find((c) => c.id === given.cellTypeId);
    if (given.cellTypeId && !cell) {
      const message = "Choose one of the cells that the device model lists.";
      throw invalid(message, [{ field: "cellTypeId", message }]);
    }
    const { then, doubt } = suppose(made, given);
    return {
      now: summaryOf(made.forecast),
      then: summaryOf(then),
      doubt,
      given: { ...given, designation: cell?.designation ?? null },
    };
  },
});
export type WhatIf = Awaited<ReturnType<typeof forecastWhatIf>>;

function refuseNothing(given: Given): void {
  const asked = [given.volts, given.periodMinutes, given.stateMilliamps, given.cellTypeId];
  if (asked.every((value) => value === null)) {
    const message = "Say what would be different: a voltage, the duty cycle, or the cells.";
    throw invalid(message, [{ field: "volts", message }]);
  }
  if (given.volts !== null && given.cellTypeId !== null) {
    const message = "A voltage of today is of the cells that are in: leave one of the two empty.";
    throw invalid(message, [{ field: "cellTypeId", message }]);
  }
}

/** The forecast as it would be, and what is odd about the voltage that was supposed. */
function suppose(made: PackForecast, given: Given): { then: Dates; doubt: string | null } {
  const { pack, now } = made.input;
  const duty = dutyOf(pack, given);
  if (given.cellTypeId !== null) {
    return { then: forecastPack(otherCells(made, duty, given.cellTypeId)), doubt: null };
  }
  const { input: read, doubt } = withReading(made.input, given);
  const then = read === made.input ? made.forecast : forecastPack(read);
  return { then: duty ? forecastAfterChange(then, pack, duty, now) : then, doubt };
}

/** The duty cycle asked for; null: as it is. */
function dutyOf(pack: PackSpec, given: Given): readonly DutyState[] | null {
  const { periodMinutes, stateMilliamps, stateName } = given;
  if (periodMinutes === null && stateMilliamps === null) return null;
  const changed = changedDuty(pack.duty, {
    // hundredths of a minute
    periodMs: periodMinutes === null ? null : periodMinutes * 600,
    state: stateMilliamps === null ? null : { name: stateName, currentUa: stateMilliamps },
  });
  if ("fault" in changed) throw invalid(changed.fault.message, [changed.fault]);
  return changed.states;
}

function withReading(
  known: ForecastInput,
  { volts: millivolts, kind }: Given,
): { readonly input: ForecastInput; readonly doubt: string | null } {
  if (millivolts === null) return { input: known, doubt: null };
  const { cell, series, cutoffMv } = known.pack;
  const before = known.readings.findLast((r) => r.kind === "resting");
  const { refusal, doubt } = judgeReading(
    {
      ...{ chemistry: cell.chemistry, nominalMv: cell.nominalMv, series, cutoffMv },
      previousRestingMv: before?.millivolts ?? null,
    },
    { millivolts, kind, temperatureDc: null },
  );
  if (refusal) throw invalid(refusal, [{ field: "volts", message: refusal }]);
  const reading = { id: "supposed", at: known.now, millivolts, kind };
  const unknown = { loadUa: null, temperatureDc: null, accuracyMv: null };
  const readings = [...known.readings, { ...reading, ...unknown }];
  return { input: { ...known, readings }, doubt };
}

/** The pack as if it had been of these cells since it went in, with the draw as it is known. */
function otherCells(
  made: PackForecast,
  duty: readonly DutyState[] | null,
  cellTypeId: string,
): ForecastInput {
  const cell = made.catalogue.cells.get(cellTypeId);
  if (!cell) throw notFound("The cell type");
  const { p05, p50, p95 } = made.forecast.drawUa;
  const measuredDraw = { averageUa: p50, relativeSd: Math.log(p95 / p05) / (2 * Z90) };
  const pack = { ...made.input.pack, cell, measuredDraw, madeAt: null };
  // Voltages of other cells say nothing of these, nor does when those would have stopped.
  const events = made.input.events.filter((e) => e.kind === "draw-changed");
  const past = { readings: [], events, prior: null };
  return { ...made.input, ...past, pack: duty ? withDuty(pack, duty) : pack };
}

type Dates = Pick<Forecast, "quantiles" | "shareLeft" | "drawUa" | "outNow">;

function summaryOf({ quantiles: q, shareLeft, drawUa, outNow }: Dates) {
  return {
    p05: fromEpochDays(q.p05),
    p50: fromEpochDays(q.p50),
    p95: fromEpochDays(q.p95),
    shareLeft: shareLeft.p50,
    drawUa: drawUa.p50,
    outNow,
  };
}

/** Sheets of the devices the benchmark tries: what any user of the product would type in. */
import type { CellSpec, Chemistry } from "../../../lib/battery/pack";
import { catalogueCell } from "../../simulate/scenario/cell-catalogue";
import type { Rng } from "../../simulate/prng";

interface Range {
  readonly low: number;
  readonly high: number;
}

export interface DeviceSheet {
  readonly designation: string;
  readonly series: readonly number[];
  /** Cut-off for each electrochemical element of 1.5, 2, 3 ... V, mV. */
  readonly cutoffMv: Range;
  readonly peakUa: Range;
  /** Life by the sheet, years. */
  readonly years: Range;
}

const range = (low: number, high: number): Range => ({ low, high });

export const SHEETS: Readonly<Record<Chemistry, readonly DeviceSheet[]>> = {
  alkaline: [
    sheet("LR6", [2, 3, 4], range(900, 1100), range(20_000, 150_000), range(1.2, 3)),
    sheet("LR14", [2, 3], range(900, 1100), range(20_000, 250_000), range(1.5, 4)),
    sheet("LR20", [2, 3, 4], range(900, 1100), range(20_000, 300_000), range(1.5, 4)),
  ],
  "zinc-carbon": [sheet("R20", [2, 4], range(900, 1050), range(10_000, 100_000), range(0.8, 2))],
  "li-fes2": [sheet("FR6", [2, 3, 4], range(950, 1200), range(20_000, 300_000), range(1.5, 5))],
  "li-socl2": [
    sheet("ER14505", [1, 2], range(2600, 3100), range(5_000, 50_000), range(2, 6)),
    sheet("ER34615", [1, 2], range(2600, 3100), range(10_000, 120_000), range(2, 6)),
  ],
  "li-mno2": [sheet("CR17345", [1, 2], range(2100, 2500), range(10_000, 200_000), range(1.2, 4))],
  "silver-oxide": [sheet("SR44", [1, 2], range(1150, 1300), range(500, 5_000), range(0.8, 2))],
  vrla: [
    sheet("VRLA 12 V 7 Ah", [1], range(10_900, 11_500), range(50_000, 900_000), range(0.4, 1.2)),
  ],
  lifepo4: [
    sheet("LFP 12.8 V 6 Ah", [1], range(10_800, 12_000), range(50_000, 900_000), range(0.5, 1.5)),
  ],
};

function sheet(
  designation: string,
  series: readonly number[],
  cutoffMv: Range,
  peakUa: Range,
  years: Range,
): DeviceSheet {
  return { designation, series, cutoffMv, peakUa, years };
}

export function cellOf(designation: string): CellSpec {
  const { chemistry, nominalMv, rated, capacityTable, selfDischargePpmPerYear, ...rest } =
    catalogueCell(designation);
  const { resistanceMohm, maxPulseUa } = rest;
  return {
    chemistry,
    nominalMv,
    rated,
    capacityTable,
    selfDischargePpmPerYear,
    resistanceMohm,
    maxPulseUa,
  };
}

/** One device model: sheet values drawn once, shared by its cohort. */
export interface DeviceModel {
  readonly key: string;
  readonly designation: string;
  readonly cell: CellSpec;
  readonly series: number;
  readonly cutoffMv: number;
  readonly averageUa: number;
  readonly peakUa: number;
  readonly seasonalShare: number;
  readonly seasonalPeak: number;
}

export function drawModel(chemistry: Chemistry, key: string, rng: Rng): DeviceModel {
  const chosen = rng.pick(SHEETS[chemistry]);
  const cell = cellOf(chosen.designation);
  const series = rng.pick(chosen.series);
  const years = rng.uniform(chosen.years.low, chosen.years.high);
  const peak = Math.exp(rng.uniform(Math.log(chosen.peakUa.low), Math.log(chosen.peakUa.high)));
  const hours = years * 8766;
  const leakUa = (cell.rated.capacityMah * cell.selfDischargePpmPerYear) / 1e3 / 8766;
  return {
    key,
    designation: chosen.designation,
    cell,
    series,
    cutoffMv: Math.round(series * rng.uniform(chosen.cutoffMv.low, chosen.cutoffMv.high)),
    averageUa: Math.max(2, (cell.rated.capacityMah * 1000) / hours - leakUa),
    peakUa: peak,
    seasonalShare: rng.uniform(0, 0.2),
    seasonalPeak: rng.next(),
  };
}

/** A duty cycle of sleep and peak whose average is the model's. */
export function dutyOf(model: DeviceModel) {
  const sleepUa = model.averageUa * 0.3;
  const share = (model.averageUa - sleepUa) / (model.peakUa - sleepUa);
  const busyMs = share * 600_000;
  return [
    { name: "sleep", currentUa: sleepUa, durationMs: 600_000 - busyMs },
    { name: "send", currentUa: model.peakUa, durationMs: busyMs },
  ];
}

/** Cells and packs the tests share. Figures from data sheets where a test relies on them. */
import type { CapacityPoint, CellSpec, ForecastInput, PackSpec } from "../../../lib/battery/pack";

export const MILD = [40, 45, 65, 90, 120, 150, 170, 170, 145, 110, 70, 45];

export function point(
  currentUa: number,
  capacityMah: number,
  cutoffMv = 800,
  temperatureDc = 200,
): CapacityPoint {
  return { currentUa, cutoffMv, temperatureDc, capacityMah };
}

/** LR6: 2.8 Ah at 25 mA to 0.8 V. */
export const LR6: CellSpec = {
  chemistry: "alkaline",
  nominalMv: 1500,
  rated: point(25_000, 2800),
  capacityTable: [],
  selfDischargePpmPerYear: 30_000,
  resistanceMohm: 150,
  maxPulseUa: 1_000_000,
};

/** Li-SOCl2 D bobbin cell, Linden & Reddy 4e, Fig. 14.17, p. 14.30, 25 °C. */
export const ER34615: CellSpec = {
  chemistry: "li-socl2",
  nominalMv: 3600,
  rated: point(4000, 19_000, 2000, 250),
  capacityTable: [
    [35_000, 7000],
    [20_000, 13_500],
    [2000, 18_800],
    [1000, 18_400],
    [200, 17_000],
  ].map(([ua, mah]) => point(ua!, mah!, 2000, 250)),
  selfDischargePpmPerYear: 10_860,
  resistanceMohm: 2000,
  maxPulseUa: 200_000,
};

export function pack(over: Partial<PackSpec> = {}): PackSpec {
  return {
    cell: LR6,
    series: 3,
    parallel: 1,
    cutoffMv: 3000,
    duty: [
      { name: "sleep", currentUa: 100, durationMs: 59_000 },
      { name: "send", currentUa: 30_000, durationMs: 200 },
    ],
    measuredDraw: null,
    monthlyMeanDc: MILD,
    madeAt: null,
    installedAt: 19_000,
    ...over,
  };
}

export function input(over: Partial<ForecastInput> = {}): ForecastInput {
  return { pack: pack(), readings: [], events: [], prior: null, now: 19_000, ...over };
}

/**
 * Which cell suits a device. Truths: charge is current times time; the order of sizes in one
 * chemistry and "a larger cell of the same voltage works the same, only longer" are common
 * practice (no source); capacities and masses of the cells are the usual ones, from memory
 * (LR03 1.2 Ah 11.5 g, LR6 2.7 Ah 23 g, LR14 8 Ah 70 g, LR20 17 Ah 141 g, FR6 3 Ah 15 g).
 */
import { describe, expect, test } from "vitest";
import type { CellSpec, Chemistry } from "@/lib/battery";
import { chooseCells, type ChoiceTerms } from "@/lib/planning/cell-choice";
import type { CandidateCell, DeviceAndPlace } from "@/lib/planning/cell-fit";

const NOW = 20_000;
const EVEN = Array.from({ length: 12 }, () => 200);

interface Figures {
  readonly chemistry: Chemistry;
  readonly nominalMv: number;
  readonly mah: number;
  readonly size: string;
  readonly massMg: number;
  readonly mohm: number;
  readonly pulseMa: number;
  readonly pence: number;
}

function cell(designation: string, figures: Figures, accepted = false): CandidateCell {
  const spec: CellSpec = {
    chemistry: figures.chemistry,
    nominalMv: figures.nominalMv,
    rated: {
      currentUa: 25_000,
      cutoffMv: figures.nominalMv === 1500 ? 800 : 2000,
      temperatureDc: 200,
      capacityMah: figures.mah,
    },
    capacityTable: [],
    selfDischargePpmPerYear: 20_000,
    resistanceMohm: figures.mohm,
    maxPulseUa: figures.pulseMa * 1000,
  };
  const { size, massMg } = figures;
  const shelf = { shelfLifeMonths: 84, unitCostMinor: figures.pence, preferred: accepted };
  return { id: designation, designation, size, spec, massMg, accepted, ...shelf };
}

const ALKALINE = { chemistry: "alkaline", nominalMv: 1500, mohm: 150, pulseMa: 1000 } as const;
const LR03 = { ...ALKALINE, mah: 1200, size: "AAA", massMg: 11_500, pence: 30 };
const LR6 = { ...ALKALINE, mah: 2700, size: "AA", massMg: 23_000, pence: 38 };
const LR14 = { ...ALKALINE, mah: 8000, size: "C", massMg: 70_000, pence: 112 };
const LR20 = { ...ALKALINE, mah: 17_000, size: "D", massMg: 141_000, pence: 165 };
const FR6 = { ...LR6, chemistry: "li-fes2", mah: 3000, massMg: 15_000, pence: 152 } as const;
const ER14505: Figures = {
  ...{ chemistry: "li-socl2", nominalMv: 3600, mah: 2600, size: "AA" },
  ...{ massMg: 18_000, mohm: 4000, pulseMa: 150, pence: 415 },
};

const device: DeviceAndPlace = {
  ...{ series: 3, parallel: 1, cutoffMv: 3300, measuredDraw: null, monthlyMeanDc: EVEN },
  duty: [
    { name: "sleep", currentUa: 100, durationMs: 890_000 },
    { name: "transmit", currentUa: 120_000, durationMs: 5000 },
  ],
};
const terms = (changed: Partial<DeviceAndPlace> = {}): ChoiceTerms => ({
  ...{ device: { ...device, ...changed }, now: NOW, visitMinor: 1000, priorOf: () => null },
});
const everything = [
  ...[cell("LR03", LR03), cell("LR6", LR6, true), cell("LR14", LR14)],
  ...[cell("LR20", LR20), cell("FR6", FR6), cell("ER14505", ER14505)],
];
const choice = chooseCells(everything, terms());
const fitting = (name: string) => choice.fitting.find((o) => o.cell.designation === name)!;

describe("life", () => {
  test("in one chemistry D lasts longer than C, C than AA, AA than AAA", () => {
    const lives = ["LR20", "LR14", "LR6", "LR03"].map((name) => fitting(name).lifeDays.p50);
    expect(lives).toEqual([...lives].sort((a, b) => b - a));
    expect(new Set(lives).size).toBe(4);
  });

  test("is charge over current, less what leaks: a D cell of 17 Ah at 0.77 mA lasts 2 to 2.6 years", () => {
    // (100 µA × 890 s + 120 mA × 5 s) / 895 s = 770 µA; 17 Ah / 0.77 mA = 2.52 years; a cut-off
    // of 1.1 V a cell leaves some of it, 2 % a year leaks.
    const years = fitting("LR20").lifeDays.p50 / 365.25;
    expect(years).toBeGreaterThan(1.9);
    expect(years).toBeLessThan(2.62);
  });

  test("is a range, and a shorter life costs more a year", () => {
    for (const { lifeDays, costPerYear } of choice.fitting) {
      expect(lifeDays.p05).toBeLessThan(lifeDays.p50);
      expect(lifeDays.p50).toBeLessThan(lifeDays.p95);
      expect(costPerYear.low).toBeLessThan(costPerYear.likely);
      expect(costPerYear.likely).toBeLessThan(costPerYear.high);
    }
  });
});

describe("a larger size of the same voltage", () => {
  test("works the same, only longer: same fresh voltage, life in proportion to the charge", () => {
    const [c, d] = [fitting("LR14"), fitting("LR20")];
    expect(d.cold.freshMv).toBe(c.cold.freshMv);
    // Leak takes the same share of both a year, more of it over the longer life.
    const ratio = d.lifeDays.p50 / c.lifeDays.p50;
    expect(ratio).toBeGreaterThan((17_000 / 8000) * 0.93);
    expect(ratio).toBeLessThanOrEqual(17_000 / 8000);
  });

  test("is told from one that the holder takes, and from a smaller one", () => {
    const holders = Object.fromEntries(
      choice.fitting.map((o) => [o.cell.designation, o.fit.holder]),
    );
    expect(holders).toEqual({
      ...{ LR6: "held", FR6: "held", LR14: "larger", LR20: "larger", LR03: "other-size" },
    });
  });
});

describe("cost of a year", () => {
  test("is cells, work and drive over the life", () => {
    const { costPerYear, lifeDays } = fitting("LR6");
    expect(costPerYear.likely).toBeCloseTo(((3 * 38 + 1000) * 365.2425) / lifeDays.p50, 6);
    expect(choice.fitting.map((o) => o.costPerYear.likely)).toEqual(
      choice.fitting.map((o) => o.costPerYear.likely).sort((a, b) => a - b),
    );
  });

  test("weighs a pack as its cells: three FR6 45 g, three LR6 69 g", () => {
    expect([fitting("FR6").massMg, fitting("LR6").massMg]).toEqual([45_000, 69_000]);
  });
});

describe("what does not fit", () => {
  const kinds = (name: string, changed: Partial<DeviceAndPlace> = {}) => {
    const { unfit } = chooseCells(everything, terms(changed));
    return unfit.find((o) => o.cell.designation === name)?.fit.misfits.map((m) => m.kind);
  };

  test("three 3.6 V cells where three of 1.5 V belong: far above what the device is made for", () => {
    expect(kinds("ER14505")).toContain("too-high");
  });

  test("a peak above the cell's pulse limit, with the capacitor that would carry it", () => {
    const duty = [{ name: "transmit", currentUa: 200_000, durationMs: 20 }];
    const { unfit } = chooseCells(everything, terms({ duty, series: 1, cutoffMv: 1000 }));
    const misfit = unfit
      .find((o) => o.cell.designation === "ER14505")
      ?.fit.misfits.find((m) => m.kind === "pulse");
    // C = I t / ΔV = 200 mA × 20 ms / 0.367 V (a tenth of 3.67 V at rest) = 10.9 mF
    expect(misfit && misfit.kind === "pulse" && misfit.capacitorUf / 1000).toBeCloseTo(10.9, 0);
  });

  test("a cut-off above what the pack shows even fresh", () => {
    expect(kinds("LR6", { cutoffMv: 5000 })).toContain("too-low");
  });

  test("alkaline cells where the night falls to −31 °C; Li-FeS2 still works", () => {
    const arctic = [-200, -190, -120, 0, 80, 130, 150, 140, 90, 20, -80, -160];
    expect(kinds("LR6", { monthlyMeanDc: arctic })).toContain("cold");
    expect(kinds("FR6", { monthlyMeanDc: arctic })).toBeUndefined();
  });
});

test("cold takes more from an alkaline cell than from Li-FeS2 (METHODS: .60 against .90 at −10 °C)", () => {
  const cool = [10, 10, 40, 80, 120, 150, 170, 170, 140, 100, 60, 20];
  const { fitting: cold } = chooseCells(everything, terms({ monthlyMeanDc: cool }));
  const share = (name: string) => cold.find((o) => o.cell.designation === name)!.cold.share;
  expect(share("LR6")).toBeLessThan(share("FR6"));
});

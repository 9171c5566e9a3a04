import { describe, expect, it } from "vitest";
import { type CellMake, freshCell, spend, terminalVolts } from "@/scripts/simulate/cell";
import { arrhenius } from "@/scripts/simulate/chemistry-law";
import { CELL_MAKES, catalogueCell } from "@/scripts/simulate/scenario/cell-catalogue";

const LOT = {
  key: "lot",
  makeKey: "",
  madeDay: 0,
  capacityFactor: 1,
  leakFactor: 1,
  resistanceFactor: 1,
  offsetV: 0,
};
const TYPICAL = { capacityFactor: 1, resistanceFactor: 1, leakFactor: 1, offsetV: 0 };

function make(designation: string): CellMake {
  return CELL_MAKES.find((m) => m.key === designation) as CellMake;
}

interface Discharge {
  readonly hours: number;
  readonly mah: number;
  readonly volts: readonly number[];
}

/** Discharges a typical fresh cell at a constant current down to a cut-off. */
function discharge(designation: string, mA: number, cutoffV: number, celsius = 20): Discharge {
  const cell = freshCell(make(designation), LOT, TYPICAL, 0);
  const step = Math.min(24, cell.fullMah / mA / 3000);
  const volts: number[] = [];
  let hours = 0;
  for (;;) {
    const v = terminalVolts(cell, mA, celsius, hours / 24);
    if (v < cutoffV || cell.wells.near <= 0) return { hours, mah: hours * mA, volts };
    volts.push(v);
    spend(cell, mA, step, celsius);
    hours += step;
  }
}

const within = (value: number, target: number, share: number): void => {
  expect(value).toBeGreaterThan(target * (1 - share));
  expect(value).toBeLessThan(target * (1 + share));
};

/** Voltage after a share of the charge that was delivered. */
const at = (d: Discharge, share: number): number =>
  d.volts[Math.floor(share * (d.volts.length - 1))] as number;

describe("capacities against published ones", () => {
  // Linden & Reddy, Handbook of Batteries, 4th ed. (2011), Fig. 14.17, p. 14.30: D bobbin, 25 °C.
  it.each([
    [4, 19.0, 0.06],
    [2, 18.8, 0.06],
    [1, 18.4, 0.06],
    [0.2, 17.0, 0.1],
    [20, 13.5, 0.12],
  ])("ER34615 at %d mA gives about %d Ah", (mA, ah, share) => {
    within(discharge("ER34615", mA, 2).mah / 1000, ah, share);
  });

  // The same figure: 35 mA gives little more than a third of what 4 mA gives, and the slowest
  // discharge gives less than a moderate one.
  it("ER34615 falls off at both ends", () => {
    expect(discharge("ER34615", 35, 2).mah).toBeLessThan(0.6 * discharge("ER34615", 4, 2).mah);
    expect(discharge("ER34615", 0.2, 2).mah).toBeLessThan(discharge("ER34615", 1, 2).mah);
  });

  // BatteryProject logs of FR6 (15 and 3 ohm) and dhennessy's (5.5 ohm), integrated to 0.9 V.
  it.each([
    [96.5, 3074],
    [235, 3037],
    [445, 2989],
  ])("FR6 at %d mA gives about %d mAh", (mA, mah) => {
    within(discharge("FR6", mA, 0.9).mah, mah, 0.03);
  });

  // A maker's sheet at second hand (2.8 Ah) and specification A0 of 2009 (18 Ah).
  it.each([
    ["LR6", 25, 0.8, 2800],
    ["LR20", 25, 0.8, 18_000],
    // From memory: IEC 60086-2's 100 ohm test of CR17345; the 20-hour rate of a block.
    ["CR17345", 28, 2, 1500],
    ["VRLA 12 V 7 Ah", 350, 10.5, 7000],
  ] as const)("%s at %d mA to %d V gives about its rating", (designation, mA, cutoff, mah) => {
    within(discharge(designation, mA, cutoff).mah, mah, 0.08);
  });
});

describe("common practice (no source)", () => {
  it("orders sizes of one chemistry D > C > AA, and alkaline above zinc-carbon in one size", () => {
    const give = (designation: string): number => discharge(designation, 25, 0.8).mah;
    expect(give("LR20")).toBeGreaterThan(give("LR14"));
    expect(give("LR14")).toBeGreaterThan(give("LR6"));
    expect(give("LR20")).toBeGreaterThan(give("R20"));
  });

  it("gives less the harder it is drawn, and far less at an ampere", () => {
    const [gentle, brisk, hard] = [25, 250, 1000].map((mA) => discharge("LR6", mA, 0.8).mah);
    expect(brisk).toBeLessThan(gentle as number);
    expect(hard).toBeLessThan(0.6 * (gentle as number));
  });

  it("lives longer for a device that stops later", () => {
    const hours = [1.2, 1.1, 1.0].map((cutoff) => discharge("LR6", 50, cutoff).hours);
    expect(hours[1]).toBeGreaterThan((hours[0] as number) * 1.05);
    expect(hours[2]).toBeGreaterThan((hours[1] as number) * 1.03);
  });

  it("falls at once a little, levels, then drops at a knee", () => {
    const d = discharge("LR6", 25, 0.8);
    const early = at(d, 0) - at(d, 0.1);
    const middle = at(d, 0.45) - at(d, 0.55);
    const late = at(d, 0.9) - at(d, 1);
    expect(early).toBeGreaterThan(1.5 * middle);
    expect(late).toBeGreaterThan(2 * middle);
  });
});

describe("shapes of curves", () => {
  // LR03 equilibrium curve fitted by C. Siegel (electrical-circuit-battery-model), state of charge 0.9..0.1.
  it("an alkaline cell rests where the published curve does", () => {
    const published = [
      [0.9, 1.43],
      [0.7, 1.352],
      [0.5, 1.305],
      [0.3, 1.237],
      [0.1, 1.071],
    ] as const;
    for (const [level, volts] of published) {
      const cell = freshCell(make("LR6"), LOT, TYPICAL, 0);
      cell.wells = { near: cell.wells.near * level, far: cell.wells.far * level };
      expect(Math.abs(terminalVolts(cell, 0, 20, 0) - volts)).toBeLessThan(0.02);
    }
  });

  // Zephyr battery.h, IFR18650: 1.47 mV for each per cent between 20 and 90 % of charge.
  it("a lithium-iron phosphate block hardly moves over its middle", () => {
    const rest = (level: number): number => {
      const cell = freshCell(make("LFP 12.8 V 6 Ah"), LOT, TYPICAL, 0);
      cell.wells = { near: cell.wells.near * level, far: cell.wells.far * level };
      return terminalVolts(cell, 0, 20, 0) / 4;
    };
    within((rest(0.9) - rest(0.2)) / 70, 0.00147, 0.35);
  });

  // From memory: open circuit 3.67 V, plateau to about 95 % of depth.
  it("lithium-thionyl chloride holds its plateau until nearly the end", () => {
    const d = discharge("ER34615", 1, 2);
    expect(at(d, 0)).toBeCloseTo(3.67, 1);
    expect(at(d, 0) - at(d, 0.9)).toBeLessThan(0.1);
    expect(at(d, 0.9) - at(d, 1)).toBeGreaterThan(0.3);
  });
});

describe("cold and time", () => {
  // A public note on capacity at 0 and −10 °C (judged rough there): LR6 .80 and .60; FR6 .95 and .90.
  it("takes more from alkaline than from lithium-iron disulphide", () => {
    const share = (designation: string, celsius: number): number =>
      discharge(designation, 250, 0.9, celsius).mah / discharge(designation, 250, 0.9).mah;
    within(share("LR6", 0), 0.8, 0.15);
    within(share("LR6", -10), 0.6, 0.25);
    within(share("FR6", 0), 0.95, 0.06);
    expect(share("FR6", -10)).toBeGreaterThan(share("LR6", -10));
  });

  // Identity: 51.216 kJ/mol doubles a rate from 20 to 30 °C.
  it("speeds by Arrhenius' law", () => {
    expect(arrhenius(51.216, 20)).toBeCloseTo(1, 12);
    expect(arrhenius(51.216, 30)).toBeCloseTo(2, 3);
  });

  // Catalogue values (mean losses a year at 20 °C; makers' sheets and memory), within a factor of two.
  it.each(["LR6", "FR6", "ER34615", "CR17345", "R20", "SR44", "VRLA 12 V 7 Ah", "LFP 12.8 V 6 Ah"])(
    "%s loses by itself about what its sheet says",
    (designation) => {
      const cell = freshCell(make(designation), LOT, TYPICAL, 0);
      for (let day = 0; day < 365; day++) spend(cell, 0, 24, 20);
      const lost = 1 - (cell.wells.near + cell.wells.far) / cell.fullMah;
      const sheet = catalogueCell(designation).selfDischargePpmPerYear / 1e6;
      expect(lost).toBeGreaterThan(sheet / 2);
      expect(lost).toBeLessThan(sheet * 2);
    },
  );
});

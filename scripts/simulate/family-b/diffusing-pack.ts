/**
 * A pack whose charge diffuses to the electrode: the charge missing at the surface is what was
 * drawn plus 2 sum of modes, each fading at m² times the slowest rate (Rakhmatov & Vrudhula's
 * one-dimensional solution, stepped mode by mode). Self-discharge slows with the root of what
 * is left and follows its own temperature factor.
 */
import type { Rng } from "../prng";
import { type VoltageLaw, resistanceRatio, restVolts } from "./voltage-laws";

const MODES = 6;

export interface DiffusingPack {
  readonly law: VoltageLaw;
  readonly series: number;
  readonly elements: number;
  readonly fullMah: number;
  readonly ohm: number;
  /** Departures from the law: of charge scale, volts, slope, leak and its ten-degree factor. */
  readonly warp: number;
  readonly offsetV: number;
  readonly tilt: number;
  readonly leakPerYear: number;
  readonly tenDegrees: number;
  readonly installedAt: number;
  gone: number;
  readonly modes: number[];
}

export interface PackSheet {
  readonly law: VoltageLaw;
  readonly series: number;
  readonly elements: number;
  readonly ratedMah: number;
  readonly sheetOhm: number;
}

/** A pack of a lot; `lot` draws what its cells share, `rng` what is this pack's own. */
export function newPack(sheet: PackSheet, lot: Rng, rng: Rng, at: number): DiffusingPack {
  return {
    law: sheet.law,
    series: sheet.series,
    elements: sheet.elements,
    fullMah: sheet.ratedMah * 1.04 * lot.logNormal(0.05) * rng.logNormal(0.035),
    ohm: sheet.sheetOhm * sheet.series * lot.logNormal(0.15) * rng.logNormal(0.15),
    warp: 1 + lot.normal(0, 0.05),
    offsetV: lot.normal(0, 0.007) + rng.normal(0, 0.004),
    tilt: lot.normal(0, 0.02),
    leakPerYear: sheet.law.leakPerYear * lot.logNormal(0.25) * rng.logNormal(0.15),
    tenDegrees: lot.uniform(1.7, 2.4),
    installedAt: at,
    gone: 0,
    modes: Array.from({ length: MODES }, () => 0),
  };
}

/** Let days pass at a current (mA) and temperature. */
export function drawFrom(
  pack: DiffusingPack,
  currentMa: number,
  days: number,
  celsius: number,
): void {
  const perDay = currentMa * 24;
  const left = Math.max(0, 1 - pack.gone / pack.fullMah);
  const leak =
    pack.leakPerYear * Math.sqrt(left) * pack.tenDegrees ** ((celsius - 20) / 10) * (days / 365.25);
  pack.gone += perDay * days + leak * pack.fullMah;
  for (let m = 1; m <= MODES; m++) {
    const rate = pack.law.diffusionPerDay * m * m;
    const fade = Math.exp(-rate * days);
    pack.modes[m - 1] = pack.modes[m - 1]! * fade + (perDay * (1 - fade)) / rate;
  }
}

/** Share of charge left at the surface. */
export function surfaceLeft(pack: DiffusingPack): number {
  const modes = pack.modes.reduce((a, b) => a + b, 0);
  return 1 - (pack.gone + 2 * modes) / pack.fullMah;
}

/** Millivolts of the pack under a load (mA), 0 at rest. */
export function packMillivolts(
  pack: DiffusingPack,
  loadMa: number,
  celsius: number,
  day: number,
): number {
  const z = surfaceLeft(pack);
  // with nothing left at the surface there is no voltage under any load
  if (z <= 0) return 0;
  const warped = z ** pack.warp;
  const rest = restVolts(pack.law, warped) + pack.offsetV + pack.tilt * (warped - 0.5) * 0.5;
  const years = (day - pack.installedAt) / 365.25;
  const ohm = pack.ohm * resistanceRatio(pack.law, warped, celsius, years);
  const open = rest * pack.series * pack.elements + 0.0002 * (celsius - 20) * pack.series;
  return open * 1000 - loadMa * ohm;
}

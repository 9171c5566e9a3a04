/**
 * Whether a cell type can run a device at all: holder, voltage from the first day to the last,
 * peak current, cold. Each "no" is a figure against a limit, so that a screen can say it in words.
 */
import {
  type CellSpec,
  type DutyState,
  holdUpCapacitorUf,
  packEndDepth,
  packPeakUa,
  resistanceMohm,
  restingMv,
  type PackSpec,
} from "@/lib/battery";
import type { Decicelsius, Microamps, Millivolts } from "@/lib/units";
import { COLDEST_DC } from "./chemistry-limits";

/** A cell type as it is compared. */
export interface CandidateCell {
  readonly id: string;
  readonly designation: string;
  readonly size: string;
  readonly spec: CellSpec;
  readonly massMg: number | null;
  readonly shelfLifeMonths: number | null;
  readonly unitCostMinor: number;
  /** The device model lists it. */
  readonly accepted: boolean;
  readonly preferred: boolean;
}

/** The device and its place. */
export interface DeviceAndPlace {
  readonly series: number;
  readonly parallel: number;
  readonly cutoffMv: Millivolts;
  readonly duty: readonly DutyState[];
  readonly measuredDraw: PackSpec["measuredDraw"];
  readonly monthlyMeanDc: readonly Decicelsius[];
}

/**
 * held: in a holder the model is made for. larger: the voltage of a listed cell in a larger size
 * of the same chemistry. other-size: any other size; both need the holder to fit.
 */
export type Holder = "held" | "larger" | "other-size";

export type Misfit =
  | { readonly kind: "too-high"; readonly freshMv: Millivolts; readonly limitMv: Millivolts }
  | { readonly kind: "too-low"; readonly loadedMv: Millivolts; readonly cutoffMv: Millivolts }
  | { readonly kind: "little-used"; readonly usedShare: number; readonly cutoffMv: Millivolts }
  | {
      readonly kind: "pulse";
      readonly peakUa: Microamps;
      readonly limitUa: Microamps;
      /** A capacitor that would carry the longest peak while the pack falls by a tenth; µF. */
      readonly capacitorUf: number;
    }
  | { readonly kind: "cold"; readonly coldestDc: Decicelsius; readonly limitDc: Decicelsius };

export interface CellFit {
  readonly holder: Holder;
  readonly misfits: readonly Misfit[];
}

/** A night of a month is this much colder than its mean (the forecast assumes the same). */
const COLD_NIGHT_DC = 110;
/** What a device made for one voltage bears beyond it. Common practice, no source. */
const OVER_VOLTAGE = 1.15;
/** A cut-off that is met with less than this of the charge used wastes the cell. */
const LEAST_USED = 0.25;

/** The coldest night of the site's year, tenths of a degree. */
export function coldestNightDc(monthlyMeanDc: readonly Decicelsius[]): Decicelsius {
  return Math.min(...monthlyMeanDc) - COLD_NIGHT_DC;
}

/** The pack that a device would run on with this cell, put in on a day. */
export function packOf(device: DeviceAndPlace, cell: CandidateCell, installedAt: number): PackSpec {
  const { series, parallel, cutoffMv, duty, measuredDraw, monthlyMeanDc } = device;
  const place = { series, parallel, cutoffMv, duty, measuredDraw, monthlyMeanDc };
  return { ...place, cell: cell.spec, madeAt: null, installedAt };
}

/** Voltage of a pack under a current at a depth of discharge and a temperature, mV. */
export function loadedPackMv(
  pack: PackSpec,
  depth: number,
  currentUa: Microamps,
  dc: Decicelsius,
): Millivolts {
  const dropMv = ((currentUa / pack.parallel) * resistanceMohm(pack.cell, depth, dc)) / 1e6;
  return pack.series * (restingMv(pack.cell, depth, dc) - dropMv);
}

/** Fit of one cell type in a device, given all that it is compared with. */
export function fitCell(
  device: DeviceAndPlace,
  cell: CandidateCell,
  all: readonly CandidateCell[],
): CellFit {
  const pack = packOf(device, cell, 0);
  const misfits = [
    tooHigh(
      pack,
      all.filter((c) => c.accepted),
    ),
    tooLow(pack),
    pulse(pack),
    tooCold(pack),
  ].filter((misfit) => misfit !== null);
  return { holder: holderOf(cell, all), misfits };
}

function holderOf(cell: CandidateCell, all: readonly CandidateCell[]): Holder {
  const listed = all.filter((c) => c.accepted);
  if (cell.accepted || listed.some((c) => c.size !== "" && c.size === cell.size)) return "held";
  const larger = listed.some(
    (c) =>
      c.spec.chemistry === cell.spec.chemistry &&
      c.spec.nominalMv === cell.spec.nominalMv &&
      cell.spec.rated.capacityMah > c.spec.rated.capacityMah,
  );
  return larger ? "larger" : "other-size";
}

function freshMv(pack: PackSpec): Millivolts {
  return pack.series * restingMv(pack.cell, 0, 200);
}

/** Listed cells show which voltage the device is made for; without any nothing can be said. */
function tooHigh(pack: PackSpec, listed: readonly CandidateCell[]): Misfit | null {
  if (listed.length === 0) return null;
  const most = Math.max(...listed.map((c) => freshMv({ ...pack, cell: c.spec })));
  const limitMv = Math.round(most * OVER_VOLTAGE);
  const fresh = Math.round(freshMv(pack));
  return fresh > limitMv ? { kind: "too-high", freshMv: fresh, limitMv } : null;
}

function tooLow(pack: PackSpec): Misfit | null {
  const { cutoffMv } = pack;
  const peak = packPeakUa(pack);
  const loadedMv = Math.round(loadedPackMv(pack, 0, peak, 200));
  if (loadedMv <= cutoffMv) return { kind: "too-low", loadedMv, cutoffMv };
  const usedShare = packEndDepth(pack, peak, 200);
  return usedShare < LEAST_USED ? { kind: "little-used", usedShare, cutoffMv } : null;
}

function pulse(pack: PackSpec): Misfit | null {
  const limit = pack.cell.maxPulseUa;
  const peakUa = packPeakUa(pack);
  if (limit === null || peakUa <= limit * pack.parallel) return null;
  const longest = Math.max(
    0,
    ...pack.duty.filter((s) => s.currentUa === peakUa).map((s) => s.durationMs),
  );
  const capacitorUf = holdUpCapacitorUf(peakUa, longest, freshMv(pack) / 10);
  return { kind: "pulse", peakUa, limitUa: limit * pack.parallel, capacitorUf };
}

function tooCold(pack: PackSpec): Misfit | null {
  const coldestDc = coldestNightDc(pack.monthlyMeanDc);
  const limitDc = COLDEST_DC[pack.cell.chemistry];
  return coldestDc < limitDc ? { kind: "cold", coldestDc, limitDc } : null;
}

/**
 * The words of the battery core: what a pack is, what was read, what is forecast.
 * Everything is per pack unless the name says cell. Time is fractional days since the
 * epoch; no function here reads a clock or draws a random number.
 */
import type {
  Decicelsius,
  EpochDays,
  Microamps,
  MilliampHours,
  Milliohms,
  Millivolts,
} from "../units";

export const CHEMISTRIES = [
  "alkaline",
  "zinc-carbon",
  "li-fes2",
  "li-socl2",
  "li-mno2",
  "silver-oxide",
  "vrla",
  "lifepo4",
] as const;
export type Chemistry = (typeof CHEMISTRIES)[number];

/** One line of a capacity table: what one cell gives at this current down to this cut-off. */
export interface CapacityPoint {
  readonly currentUa: Microamps;
  readonly cutoffMv: Millivolts;
  readonly temperatureDc: Decicelsius;
  readonly capacityMah: MilliampHours;
}

export interface CellSpec {
  readonly chemistry: Chemistry;
  readonly nominalMv: Millivolts;
  /** Rated capacity at the rated current, cut-off and temperature. */
  readonly rated: CapacityPoint;
  /** Further measured points; may be empty. The rated point need not be repeated. */
  readonly capacityTable: readonly CapacityPoint[];
  /** Share of rated capacity lost per year at 20 °C, parts per million. */
  readonly selfDischargePpmPerYear: number;
  /** Internal resistance of a fresh cell at 20 °C. */
  readonly resistanceMohm: Milliohms;
  readonly maxPulseUa: Microamps | null;
}

/** One named state of a duty cycle. `durationMs` is the time spent in it each period. */
export interface DutyState {
  readonly name: string;
  readonly currentUa: Microamps;
  readonly durationMs: number;
}

export interface PackSpec {
  readonly cell: CellSpec;
  readonly series: number;
  readonly parallel: number;
  /** Voltage of the whole pack under the device's peak current at which the device stops. */
  readonly cutoffMv: Millivolts;
  readonly duty: readonly DutyState[];
  /** A measured average draw overrides the duty cycle's average. */
  readonly measuredDraw: { readonly averageUa: Microamps; readonly relativeSd: number } | null;
  /** Mean temperature of each month, January first. */
  readonly monthlyMeanDc: readonly Decicelsius[];
  /** When the cells were made (shelf ageing), if known. */
  readonly madeAt: EpochDays | null;
  readonly installedAt: EpochDays;
}

/** A voltage of the whole pack at a moment. */
export interface PackReading {
  readonly id: string;
  readonly at: EpochDays;
  readonly millivolts: Millivolts;
  readonly kind: "resting" | "loaded";
  /** Load current during a loaded reading; null: the device's own peak is assumed. */
  readonly loadUa: Microamps | null;
  readonly temperatureDc: Decicelsius | null;
  /** One standard deviation of the instrument; null: 10 mV assumed. */
  readonly accuracyMv: Millivolts | null;
}

/** What is known besides voltages. */
export interface PackEvent {
  readonly at: EpochDays;
  /** reporting: alive at `at`. stopped: found stopped at `at`, last heard `lastAliveAt`. */
  readonly kind: "reporting" | "stopped" | "draw-changed";
  readonly lastAliveAt?: EpochDays;
}

/**
 * How the voltage of cells in one cohort departs from the published curve, by depth in equal
 * steps from 0 to 1, learned from packs that ran out (`learnCurves`).
 */
export interface CurveLesson {
  /** To be added to the resting voltage of one element, mV. */
  readonly restShiftMv: readonly number[];
  /** Factor on the resistance. */
  readonly resistanceFactor: readonly number[];
  /** Spread of single packs around that, mV of one element, and of readings around a pack. */
  readonly spreadMv: number;
  readonly noiseMv: number;
  /** Spread of the resistance between packs, as a share. */
  readonly resistanceSd: number;
  readonly packs: number;
}

/**
 * How forecasts of past packs turned out: with z the normal score of the probability that was
 * given to the day a pack stopped, its mean and spread (0 and 1 for a perfect forecaster).
 */
export interface Calibration {
  readonly shift: number;
  readonly spread: number;
}

/** What the fleet taught about packs like this one; factors multiply the data-sheet values. */
export interface FleetPrior {
  readonly capacityFactor: { readonly mean: number; readonly relativeSd: number };
  readonly drawFactor: { readonly mean: number; readonly relativeSd: number };
  /** How many finished packs the prior rests on. */
  readonly packs: number;
  readonly curve?: CurveLesson | null;
  /** Resistance that decides the end, relative to the sheet's. */
  readonly endResistance?: { readonly mean: number; readonly sd: number } | null;
  readonly calibration?: Calibration | null;
}

/** A temperature logged at the pack's site: of a moment, or a day's mean. */
export interface LoggedTemperature {
  readonly at: EpochDays;
  readonly temperatureDc: Decicelsius;
}

/** A shift of the draw found for the pack's device model; made by `withDrawShift`. */
export interface FoundDrawShift {
  readonly at: EpochDays;
  /** Draw after over draw before, and its spread for one device, as a share. */
  readonly factor: number;
  readonly relativeSd: number;
}

export interface ForecastInput {
  readonly pack: PackSpec;
  readonly readings: readonly PackReading[];
  readonly events: readonly PackEvent[];
  readonly prior: FleetPrior | null;
  readonly now: EpochDays;
  /**
   * Temperatures logged at the site, in any order. They hold for the past: self-discharge, the
   * resistance at readings without a temperature of their own, and how cold it was when the
   * device ran or stopped. Between two more than three days apart, and for the future, the
   * climate holds.
   */
  readonly temperatures?: readonly LoggedTemperature[];
  /** Shifts of its model's draw that the fleet's readings showed. */
  readonly drawShifts?: readonly FoundDrawShift[];
}

/** How much one reading counted, and why, in the words of `reason`. */
export interface ReadingWeight {
  readonly readingId: string;
  /** Posterior probability (0..1) that the reading belongs to this pack's curve. */
  readonly weight: number;
  readonly expectedMv: Millivolts;
  /** 5th and 95th percentile of what was expected before the reading was seen. */
  readonly expectedLowMv: Millivolts;
  readonly expectedHighMv: Millivolts;
  readonly reason: "fits" | "doubtful" | "passivation" | "before-install" | "impossible";
}

export interface Forecast {
  /** Days since the epoch at which the device stops: quantiles of the distribution. */
  readonly quantiles: {
    readonly p05: EpochDays;
    readonly p20: EpochDays;
    readonly p50: EpochDays;
    readonly p80: EpochDays;
    readonly p95: EpochDays;
  };
  /**
   * The same distribution at probabilities 0.01, 0.03, ... 0.99 (50 values, ascending);
   * everything that prices waiting reads this.
   */
  readonly cdfDays: readonly EpochDays[];
  /** Share of usable charge left now, 0..1. */
  readonly shareLeft: { readonly p05: number; readonly p50: number; readonly p95: number };
  /** Average draw now, microamps per pack. */
  readonly drawUa: { readonly p05: number; readonly p50: number; readonly p95: number };
  /** Probability that the device has already stopped at `now`. */
  readonly outNow: number;
  readonly weights: readonly ReadingWeight[];
  readonly basis: {
    readonly restingReadings: number;
    readonly loadedReadings: number;
    readonly doubtfulReadings: number;
    readonly measuredDraw: boolean;
    readonly fleetPacks: number;
  };
}

/**
 * Every spread the forecast assumes, in one place. Shares and factors are one standard
 * deviation unless they say otherwise. They are priors: readings and the fleet move them.
 */
export const ASSUMED = {
  /** Makers rate at currents above those of the field, where a cell gives a little more. */
  capacityMean: 1.03,
  /** Cell-to-cell and lot-to-lot capacity (5-10 % across brands of LR6 under one load). */
  capacitySd: 0.08,
  /**
   * ln(life) from pack to pack in one device: cells of one type differ little (Dong & Gupta
   * found their lives' variation negligible), a device's draw hardly more from pack to pack.
   */
  packLifeSd: 0.05,
  /** Device draw against its duty cycle. */
  drawSd: 0.15,
  /** Draw of a load that never pauses, against what is stated of it. */
  constantDrawSd: 0.07,
  /** Wander of ln(draw) in a year, as a random walk. */
  drawWalkPerYear: 0.05,
  /** A season's draw against the year's mean (cold, daylight, wet-weather reporting). */
  seasonalDrawSd: 0.08,
  /** Draw after a firmware or device change, against the duty cycle. */
  changedDrawSd: 0.35,
  /** How differently the devices of a model take a shift of their draw. */
  deviceShiftSd: 0.1,
  /** Depth at which a new pack starts, beside shelf ageing. */
  startDepthSd: 0.01,
  /** Depth over which a curve's error stays the same, roughly. */
  curveErrorDepth: 0.3,
  /** The same once the curve was learned from finished packs: what is left is the pack's own. */
  taughtErrorDepth: 1,
  /** Readings closer together than this share of the charge share their errors. */
  sharedErrorDepth: 0.04,
  /** Where on the depth axis the curve of this very pack lies. */
  curveDepthSd: 0.012,
  /** Cells of one lot differ; a string ends a little before its mean cell does. */
  weakestCellShare: 0.02,
  /**
   * A stop comes in a month's coldest hour: this much below the month's mean, K, give or take
   * `coldHourSdK` (a temperate month of mean 4 °C has a night of about -7 °C; from memory).
   */
  coldHourK: 11,
  coldHourSdK: 3,
  /** Internal resistance against the table. */
  resistanceSd: 0.25,
  /** Where a load that hardly ever pauses ends beside where the curves say. */
  steadyEndSd: 0.05,
  /** The resistance that decides the end, once learned from where a cohort's packs stopped. */
  taughtEndSd: 0.3,
  /** How unevenly it grows in a year, as a share. */
  resistanceWalkPerYear: 0.1,
  /** Chance that a reading is not of this pack, mistyped, or of another state. */
  outlierShare: 0.04,
  /** Instrument accuracy when none is given, mV. */
  accuracyMv: 10,
  /** Temperature of a reading when only the month's mean is known, K. */
  temperatureSdK: 5,
  /** The same when the site's temperature was logged. */
  loggedTemperatureSdK: 2,
  /**
   * A low loaded reading of Li-SOCl2 is the film's with this chance at the most, rested or kept
   * thin by the device's own pulses, and grows towards it in about so many days (from memory).
   */
  filmMost: 0.95,
  filmMostPulsed: 0.35,
  filmDays: 60,
  /** Readings above this multiple of the fresh resting voltage are impossible. */
  impossibleShare: 1.25,
  /** No date lies further ahead of `now` or the installation than this, days. */
  horizonDays: 40 * 365.2425,
} as const;

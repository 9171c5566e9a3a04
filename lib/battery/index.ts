/** The battery core's public face. Everything else in this folder may change freely. */
export type {
  CapacityPoint,
  CellSpec,
  Calibration,
  Chemistry,
  CurveLesson,
  DutyState,
  FleetPrior,
  Forecast,
  ForecastInput,
  FoundDrawShift,
  LoggedTemperature,
  PackEvent,
  PackReading,
  PackSpec,
  ReadingWeight,
} from "./pack";
export { CHEMISTRIES } from "./pack";
export { averageUa, holdUpCapacitorUf, packAverageUa, packPeakUa, peakUa } from "./duty";
export { dischargeHours, usableCapacity } from "./capacity";
export { resistanceMohm, restingMv } from "./curves";
export { packEndDepth } from "./cutoff";
export { ageing, equivalentCelsius, selfDischargeUa, tenDegreeFactor } from "./self-discharge";
export { CDF_PROBABILITIES, chanceOutBy, forecastPack } from "./forecast";
export { type ExpectedVoltage, type VoltageQuery, expectedVoltage } from "./voltage-band";
export { forecastFaults } from "./validate";
export { type ColdSnap, coldSnap } from "./cold-snap";
export {
  type CohortLife,
  type FinishedPack,
  cohortPrior,
  devicePrior,
  learnCohorts,
} from "./fleet-prior";
export {
  type FinishedHistory,
  type FleetLesson,
  type FleetMember,
  learnFleet,
} from "./fleet-lesson";
export { withDrawShift } from "./draw-shift";
export {
  type BadLot,
  type DrawObservation,
  type DrawShift,
  badLots,
  drawShifts,
} from "./fleet-findings";

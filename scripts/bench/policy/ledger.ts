/** The same books for every policy: what was spent, and on what, in minor currency units. */
export const CAUSES = [
  "cells",
  "work",
  "looking",
  "crewOnTheRoad",
  "kilometres",
  "urgentTrips",
  "silence",
  "wornStock",
] as const;
export type Cause = (typeof CAUSES)[number];

export interface Ledger {
  readonly minor: Record<Cause, number>;
  visits: number;
  metres: number;
  deadHours: number;
  swaps: number;
  stops: number;
  urgentTrips: number;
  reads: number;
  /** Rated charge of the packs that came out, and what was still in them. */
  outMah: number;
  leftMah: number;
}

export function openLedger(): Ledger {
  const minor = Object.fromEntries(CAUSES.map((cause) => [cause, 0])) as Record<Cause, number>;
  const counts = { visits: 0, metres: 0, deadHours: 0, swaps: 0, stops: 0, urgentTrips: 0 };
  return { minor, ...counts, reads: 0, outMah: 0, leftMah: 0 };
}

export interface PolicyRow {
  readonly policy: string;
  readonly seed: string;
  readonly costPerDeviceYear: number;
  readonly deadHoursPerDeviceYear: number;
  readonly visitsPerDeviceYear: number;
  readonly kmPerDeviceYear: number;
  readonly wastedAhShare: number;
}

export interface Result extends PolicyRow {
  /** Minor units a device-year by cause. */
  readonly byCause: Readonly<Record<Cause, number>>;
  readonly swapsPerDeviceYear: number;
  readonly stopsPerDeviceYear: number;
  readonly urgentPerDeviceYear: number;
  readonly readsPerDeviceYear: number;
}

/** Totals over device-years. Costs in the result are in major units (pounds). */
export function closeLedger(
  ledger: Ledger,
  policy: string,
  seed: string,
  deviceYears: number,
): Result {
  const per = (total: number) => total / deviceYears;
  const byCause = Object.fromEntries(
    CAUSES.map((cause) => [cause, per(ledger.minor[cause])]),
  ) as Record<Cause, number>;
  const minor = CAUSES.reduce((sum, cause) => sum + byCause[cause], 0);
  return {
    policy,
    seed,
    costPerDeviceYear: minor / 100,
    deadHoursPerDeviceYear: per(ledger.deadHours),
    visitsPerDeviceYear: per(ledger.visits),
    kmPerDeviceYear: per(ledger.metres) / 1000,
    wastedAhShare: ledger.outMah > 0 ? ledger.leftMah / ledger.outMah : 0,
    byCause,
    swapsPerDeviceYear: per(ledger.swaps),
    stopsPerDeviceYear: per(ledger.stops),
    urgentPerDeviceYear: per(ledger.urgentTrips),
    readsPerDeviceYear: per(ledger.reads),
  };
}

/**
 * The last measured comparison of four ways to decide when a pack is swapped: simulated years of
 * the demonstration's fleet, written by `npm run bench:policy -- --write` and shown as it is.
 */
import type { IsoDay } from "@/lib/units";
import measured from "./policy-record.json";

export type PolicyName =
  "fixed-interval" | "inspection-threshold" | "run-to-failure" | "wanewright";

/** Where the money goes; `wornStock` is charge used up beyond what was put in (may be negative). */
export type PolicyCause =
  | "cells"
  | "work"
  | "looking"
  | "crewOnTheRoad"
  | "kilometres"
  | "urgentTrips"
  | "silence"
  | "wornStock";

/** One policy over one simulated world, or its mean over all of them. All a device-year. */
export interface PolicyOutcome {
  readonly policy: PolicyName;
  /** Pounds; the sum of `poundsByCause`. */
  readonly pounds: number;
  readonly deadHours: number;
  readonly visits: number;
  readonly kilometres: number;
  readonly swaps: number;
  /** Devices that stopped before their swap. */
  readonly stops: number;
  readonly urgentTrips: number;
  readonly reads: number;
  /** Share of the rated charge that was still in the packs that came out, 0 to 1. */
  readonly wastedShare: number;
  readonly poundsByCause: Readonly<Record<PolicyCause, number>>;
}

export interface PolicyRecord {
  /** How to measure it again, and on what it was measured. */
  readonly command: string;
  readonly machine: string;
  readonly measuredOn: IsoDay;
  readonly assets: number;
  readonly years: number;
  /** Worlds lived through, and the others on which the simple policies were set. */
  readonly seeds: readonly string[];
  readonly setOn: readonly string[];
  /** Mean over the seeds, in the order in which the policies are told. */
  readonly means: readonly PolicyOutcome[];
  readonly bySeed: readonly (PolicyOutcome & { readonly seed: string })[];
}

export const policyRecord = measured as PolicyRecord;

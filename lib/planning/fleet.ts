/**
 * The planner's words: what must be known about packs, sites, technicians and prices to plan
 * visits. Money is minor currency units, times are seconds of the wall clock, days are local.
 */
import type { EpochDays, IsoDay, Metres, Minor, Seconds } from "@/lib/units";
import type { LifeQuantiles } from "./life";

export const TICKETS = [
  "height",
  "boat",
  "confined_space",
  "roadside",
  "explosive_atmosphere",
] as const;
export type Ticket = (typeof TICKETS)[number];

export interface PointOnEarth {
  readonly latitude: number;
  readonly longitude: number;
}

/** One installed pack with its forecast. */
export interface PlanningPack {
  readonly packId: string;
  readonly assetId: string;
  readonly tag: string;
  readonly assetName: string;
  readonly siteId: string;
  readonly life: LifeQuantiles;
  readonly installedAt: EpochDays;
  /** 0..1, the median of what is left. */
  readonly shareLeft: number;
  readonly silenceMinorPerHour: Minor;
  /** What would be put in: type, cells of the whole pack, their price. */
  readonly cellTypeId: string;
  readonly designation: string;
  readonly cells: number;
  readonly cellsMinor: Minor;
  readonly swapS: Seconds;
  readonly readS: Seconds;
  /** The fixed interval that the organisation used before, if it had one. */
  readonly habitIntervalDays: number | null;
}

/** A closed season that returns every year, MM-DD to MM-DD; it may span New Year. */
export interface ClosedSeason {
  readonly firstMonthDay: string;
  readonly lastMonthDay: string;
  readonly reason: string;
}

/** A technician could not do the work and named a day from which it can be tried again. */
export interface ReturnDay {
  readonly day: IsoDay;
  readonly reason: "no_access" | "flooded" | "not_found" | "unsafe" | "no_cells" | "other";
}

export interface PlanningSite extends PointOnEarth {
  readonly siteId: string;
  readonly code: string;
  readonly name: string;
  readonly noticeDays: number;
  readonly hours: { readonly opensS: Seconds; readonly closesS: Seconds } | null;
  readonly closures: readonly ClosedSeason[];
  readonly tickets: readonly Ticket[];
  readonly keyCode: string | null;
  /** Left out or null: nobody said that it cannot be done before some day. */
  readonly returnOn?: ReturnDay | null;
}

export interface Absence {
  readonly firstDay: IsoDay;
  readonly lastDay: IsoDay;
  readonly reason: string;
}

export interface PlanningTechnician {
  readonly technicianId: string;
  readonly name: string;
  readonly crewId: string;
  readonly depot: PointOnEarth;
  readonly tickets: readonly Ticket[];
  readonly shifts: readonly {
    readonly weekday: number;
    readonly startsS: Seconds;
    readonly endsS: Seconds;
    /** Work and driving stand still between these; left out: no break. */
    readonly pause?: { readonly startsS: Seconds; readonly endsS: Seconds } | null;
  }[];
  readonly absences: readonly Absence[];
  /** Cells that the van holds; null when nobody said. */
  readonly vanCells: number | null;
  /** Days on which a round that is not part of this plan already binds. */
  readonly takenDays: readonly IsoDay[];
}

export interface PlanningPrices {
  readonly crewMinorPerHour: Minor;
  readonly overtimeMinorPerHour: Minor;
  readonly travelMinorPerKm: Minor;
}

/** Driving between places, square tables by row and column of the places asked for. */
export interface TravelTable {
  readonly seconds: ArrayLike<Seconds>;
  readonly metres: ArrayLike<Metres>;
}

/** A task at a stop. `cells` is 0 for anything but a swap. */
export interface PlannedTask {
  readonly kind: "swap" | "read" | "inspect";
  readonly assetId: string;
  readonly packId: string | null;
  readonly cellTypeId: string | null;
  readonly cells: number;
}

/** Where a visit stands already: in a round that binds, or in the draft being changed. */
export interface KnownVisit {
  readonly siteId: string;
  readonly technicianId: string;
  readonly day: IsoDay;
  readonly position: number;
  readonly locked: boolean;
  /** Only a draft has it there: moving it costs no message. Left out: people know of it. */
  readonly untold?: boolean;
  readonly tasks: readonly PlannedTask[];
}

/** Days and the place in time that a plan is made for. */
export interface PlanningFrame {
  readonly timeZone: string;
  readonly now: Date;
  readonly firstDay: IsoDay;
  readonly lastDay: IsoDay;
  /** ISO weekdays on which the organisation works. */
  readonly workingDays: readonly number[];
}

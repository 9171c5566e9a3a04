/**
 * What a phone carries for its days without signal: everything the field pages show and the
 * battery core computes with, each thing once. Instants are ISO strings, days `YYYY-MM-DD` in the
 * organisation's time zone, `...Day` numbers are fractional days since the epoch.
 */
export const DAY_PACK_VERSION = 1;

export interface DayTask {
  readonly id: string;
  readonly kind: "swap" | "read" | "inspect";
  readonly assetId: string;
  readonly packId: string | null;
  readonly cellTypeId: string | null;
  readonly cells: number;
  readonly state: "planned" | "done" | "not_done";
}

export interface DayStop {
  readonly id: string;
  readonly siteId: string;
  readonly position: number;
  readonly arrivesAt: string;
  readonly departsAt: string;
  readonly state: "planned" | "done" | "cannot_do";
  readonly cannotReason: string | null;
  readonly returnOn: string | null;
  readonly doneAt: string | null;
  readonly tasks: readonly DayTask[];
}

export interface DayRound {
  readonly id: string;
  readonly day: string;
  readonly state: "published" | "started" | "done";
  readonly startsAt: string;
  readonly endsAt: string;
  readonly driveS: number;
  readonly workS: number;
  readonly distanceM: number;
  /** When the technician gave the stops an order of their own. A day from before has none. */
  readonly reorderedAt?: string | null;
  /** When the office replaced that order by its own. A day from before has none. */
  readonly orderReplacedAt?: string | null;
  readonly stops: readonly DayStop[];
}

export interface DaySite {
  readonly id: string;
  readonly code: string;
  readonly name: string;
  readonly latitude: number;
  readonly longitude: number;
  readonly opens: string | null;
  readonly closes: string | null;
  readonly closures: readonly { readonly from: string; readonly to: string; reason: string }[];
  readonly keyCode: string | null;
  readonly contactName: string | null;
  readonly contactPhone: string | null;
  readonly hazards: readonly string[];
  readonly tickets: readonly string[];
  readonly notes: string;
}

export interface DayReading {
  readonly id: string;
  readonly atDay: number;
  readonly millivolts: number;
  readonly kind: "resting" | "loaded";
  readonly loadUa: number | null;
  readonly temperatureDc: number | null;
  readonly accuracyMv: number | null;
}

export interface DayEvent {
  readonly atDay: number;
  readonly kind: "reporting" | "stopped" | "draw-changed";
  readonly lastAliveDay: number | null;
}

export interface DayForecast {
  readonly computedAt: string;
  readonly stale: boolean;
  readonly p05: string;
  readonly p50: string;
  readonly p95: string;
  readonly sharePermille: number;
  readonly shareLowPermille: number;
  readonly shareHighPermille: number;
  readonly outNowPermille: number;
}

export interface DayPackInService {
  readonly id: string;
  readonly cellTypeId: string;
  readonly lotCode: string | null;
  readonly series: number;
  readonly parallel: number;
  readonly installedDay: number;
  readonly madeDay: number | null;
  readonly measuredDraw: { readonly averageUa: number; readonly relativeSd: number } | null;
  readonly readings: readonly DayReading[];
  readonly events: readonly DayEvent[];
  readonly forecast: DayForecast | null;
}

export interface DayAsset {
  readonly id: string;
  readonly tag: string;
  readonly name: string;
  readonly siteId: string;
  readonly modelId: string;
  readonly state: "in_service" | "stored" | "retired";
  readonly note: string;
  /** Index into `climates`. */
  readonly climate: number;
  readonly pack: DayPackInService | null;
  /** Whether its pack is worth swapping by somebody who is there; a day from before has none. */
  readonly worth?: DayWorth | null;
}

/** What swapping a neighbour while there is worth, against a later trip. */
export interface DayWorth {
  /** due: waiting costs more than the life thrown away; near: it saves a trip; later: it can wait. */
  readonly standing: "due" | "near" | "later";
  /** What it saves, in minor units of the currency; negative: what it would throw away. */
  readonly savesMinor: number;
  /** The day a later visit would be best. */
  readonly laterDay: string;
}

export interface DayModel {
  readonly id: string;
  readonly name: string;
  readonly cutoffMv: number;
  readonly series: number;
  readonly parallel: number;
  readonly duty: readonly {
    readonly name: string;
    readonly currentUa: number;
    readonly durationMs: number;
  }[];
  /** The preferred one first. */
  readonly cellTypeIds: readonly string[];
}

interface CellPoint {
  readonly currentUa: number;
  readonly cutoffMv: number;
  readonly temperatureDc: number;
  readonly capacityMah: number;
}

export interface DayCellType {
  readonly id: string;
  readonly designation: string;
  readonly spec: {
    readonly chemistry: string;
    readonly nominalMv: number;
    readonly rated: CellPoint;
    readonly capacityTable: readonly CellPoint[];
    readonly selfDischargePpmPerYear: number;
    readonly resistanceMohm: number;
    readonly maxPulseUa: number | null;
  };
}

export interface DayLot {
  readonly lotId: string;
  readonly code: string;
  readonly cellTypeId: string;
  readonly madeOn: string | null;
  readonly cells: number;
}

export interface DayPack {
  readonly version: typeof DAY_PACK_VERSION;
  /** When the server made it; entries applied before that are in it. */
  readonly madeAt: string;
  readonly person: { readonly id: string; readonly name: string };
  readonly organisation: {
    readonly name: string;
    readonly locale: string;
    readonly timeZone: string;
    readonly currency: string;
    /** Whether photos keep where they were taken; a day from before does not say: no. */
    readonly keepPhotoPosition?: boolean;
  };
  readonly van: {
    readonly placeId: string;
    readonly name: string;
    readonly lots: readonly DayLot[];
  } | null;
  readonly rounds: readonly DayRound[];
  readonly sites: readonly DaySite[];
  readonly assets: readonly DayAsset[];
  readonly models: readonly DayModel[];
  readonly cellTypes: readonly DayCellType[];
  /** Mean temperature of each month in tenths of a degree, January first. */
  readonly climates: readonly (readonly number[])[];
}

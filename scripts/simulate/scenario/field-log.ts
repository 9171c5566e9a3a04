/** What three years in the field leave behind: packs, voltages, events and rounds. */
export type ReasonOut = "due" | "early" | "found_stopped" | "fault" | "device_removed";

export interface ScenarioPack {
  readonly key: string;
  readonly assetTag: string;
  readonly designation: string;
  readonly lotCode: string;
  readonly series: number;
  readonly parallel: number;
  readonly madeDay: number;
  readonly installedAt: Date;
  readonly installedBy: string;
  removedAt: Date | null;
  removedBy: string | null;
  reasonOut: ReasonOut | null;
  voltageOutMv: number | null;
  /** When the device's first message was missed, if it fell silent. */
  stoppedAt: Date | null;
  lookOut: string;
}

export interface ScenarioReading {
  readonly key: string;
  readonly packKey: string;
  readonly at: Date;
  readonly millivolts: number;
  readonly kind: "resting" | "loaded";
  readonly loadUa: number | null;
  readonly temperatureDc: number | null;
  readonly accuracyMv: number | null;
  readonly instrument: string;
  readonly technicianKey: string;
  readonly note: string;
}

export interface ScenarioDeviceEvent {
  readonly assetTag: string;
  readonly at: Date;
  readonly kind: "stopped" | "firmware_changed";
  readonly lastHeardAt: Date | null;
  readonly note: string;
  readonly technicianKey: string | null;
}

/** A measured average current. */
export interface ScenarioDraw {
  readonly assetTag: string;
  readonly at: Date;
  readonly averageUa: number;
}

export interface ScenarioTask {
  readonly assetTag: string;
  readonly kind: "swap" | "read" | "inspect";
  /** The pack that was in when the technician came; null when there was none. */
  readonly packKey: string | null;
  readonly designation: string | null;
  readonly cells: number;
}

export interface ScenarioStop {
  readonly siteCode: string;
  readonly arrivesAt: Date;
  readonly departsAt: Date;
  readonly tasks: readonly ScenarioTask[];
}

export interface ScenarioRound {
  readonly technicianKey: string;
  readonly day: number;
  readonly state: "done" | "published";
  readonly startsAt: Date;
  readonly endsAt: Date;
  readonly driveS: number;
  readonly workS: number;
  readonly distanceM: number;
  readonly stops: readonly ScenarioStop[];
}

export interface FieldLog {
  readonly packs: ScenarioPack[];
  readonly readings: ScenarioReading[];
  readonly events: ScenarioDeviceEvent[];
  readonly rounds: ScenarioRound[];
  /** Packs in service, by asset. */
  readonly installed: Map<string, ScenarioPack>;
}

export function emptyLog(): FieldLog {
  return { packs: [], readings: [], events: [], rounds: [], installed: new Map() };
}

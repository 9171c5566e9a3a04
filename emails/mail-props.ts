import type { Presentation } from "@/lib/present/locale";

/**
 * The plain data each mail template takes. Instants are ISO 8601 text, days YYYY-MM-DD:
 * props travel through jsonb between the use case that orders a mail and the worker.
 */
export interface HouseProps extends Presentation {
  /** The organisation's name. */
  readonly organisation: string;
}

export interface LinkMailProps extends HouseProps {
  readonly name: string;
  readonly url: string;
  readonly expiresAt: string;
}

export interface RoundMailTask {
  readonly kind: "swap" | "read" | "inspect";
  readonly tag: string;
  readonly assetName: string;
  readonly designation: string | null;
  readonly cells: number;
}
export interface RoundMailStop {
  readonly position: number;
  readonly arrivesAt: string;
  readonly departsAt: string;
  readonly siteName: string;
  readonly latitude: number;
  readonly longitude: number;
  /** The way in: key, hours, drive-up notes; empty when nothing is known. */
  readonly access: string;
  readonly hazards: readonly string[];
  readonly tasks: readonly RoundMailTask[];
}
export interface RoundMailProps extends HouseProps {
  readonly technicianName: string;
  readonly day: string;
  /** The round on the phone. */
  readonly url: string;
  readonly depotName: string;
  readonly startsAt: string;
  readonly endsAt: string;
  readonly distanceM: number;
  readonly driveS: number;
  readonly workS: number;
  readonly stops: readonly RoundMailStop[];
  readonly load: readonly { readonly designation: string; readonly cells: number }[];
  readonly keys: readonly string[];
  /** What changed since the last mail, in words; empty for a first one. */
  readonly changes: readonly string[];
  /** RFC 5545: the same UID with a higher SEQUENCE replaces the entry. */
  readonly calendar: { readonly uid: string; readonly sequence: number; readonly stamp: string };
}

/** For the contact of a site: when somebody comes. */
export interface VisitMailProps extends HouseProps {
  readonly contactName: string;
  readonly siteName: string;
  readonly day: string;
  /** Local time of arrival, "09:20". */
  readonly around: string;
  readonly minutes: number;
  readonly technicianName: string;
}

export interface DigestProps extends HouseProps {
  readonly name: string;
  readonly url: string;
  readonly day: string;
  readonly horizonDays: number;
  readonly outNow: readonly DigestLine[];
  readonly due: readonly DigestLine[];
  /** How many are due beyond those listed. */
  readonly more: number;
  readonly expected: { readonly p05: number; readonly mean: number; readonly p95: number };
  readonly notBooked: number;
}
export interface DigestLine {
  readonly tag: string;
  readonly assetName: string;
  readonly siteName: string;
  /** "9 %" or "out". */
  readonly left: string;
  readonly p05: string;
  readonly p50: string;
  readonly p95: string;
  /** Day of a published visit, if there is one. */
  readonly visitOn: string | null;
}

import type { IsoDay } from "@/lib/units";
import { dayOfInstant } from "./calendar-days";
import { formatWindow } from "./format-day";
import type { Presentation } from "./locale";
import { packDisc } from "./rounds-board";
import type { WaneDiscModel } from "./wane-disc";

export interface MapPackInput {
  readonly assetId: string;
  readonly tag: string;
  readonly assetName: string;
  readonly siteName: string;
  readonly latitude: number;
  readonly longitude: number;
  readonly p05: Date | null;
  readonly p50: Date | null;
  readonly p95: Date | null;
  readonly shareLeftPermille: number | null;
  readonly outNowPermille: number | null;
}

export interface MapPack {
  readonly assetId: string;
  readonly tag: string;
  readonly name: string;
  readonly site: string;
  readonly latitude: number;
  readonly longitude: number;
  readonly disc: WaneDiscModel;
  /** "5 Dec – 1 Jan, likely 15 Dec". */
  readonly window: string;
}

/** A pack as a mark on the map and a line beside it. */
export function mapPack(pack: MapPackInput, today: IsoDay, presentation: Presentation): MapPack {
  const { locale, timeZone } = presentation;
  const [p5, p50, p95] = [pack.p05, pack.p50, pack.p95].map((at) =>
    at ? dayOfInstant(at, timeZone) : null,
  );
  return {
    assetId: pack.assetId,
    tag: pack.tag,
    name: pack.assetName,
    site: pack.siteName,
    latitude: pack.latitude,
    longitude: pack.longitude,
    disc: packDisc(pack, today, presentation),
    window:
      p5 && p50 && p95 ? formatWindow({ p5, p50, p95 }, locale, today).text : "no forecast yet",
  };
}

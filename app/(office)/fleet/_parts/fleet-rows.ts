import { dayNumber, dayOfInstant } from "@/lib/present/calendar-days";
import { formatDay, formatWindow, type WindowLabel } from "@/lib/present/format-day";
import { formatVolts } from "@/lib/present/format-quantity";
import { OUT_PERMILLE, packLabel } from "@/lib/present/horizon";
import { NOTHING } from "@/lib/present/locale";
import { packTone } from "@/lib/present/tone";
import { waneDisc, type WaneDiscModel } from "@/lib/present/wane-disc";
import type { AssetListView } from "@/lib/usecases/list-assets";
import { STATE_WORDS } from "./fleet-words";

export interface FleetRow {
  readonly tag: string;
  readonly name: string;
  readonly site: string;
  readonly siteCode: string;
  readonly model: string;
  readonly pack: string;
  readonly disc: WaneDiscModel | null;
  readonly window: WindowLabel | null;
  readonly reading: string;
  readonly state: string;
}

/** The fleet's rows in finished words and marks. */
export function fleetRows({ rows, organisation, now }: AssetListView): FleetRow[] {
  const { locale, timeZone } = organisation;
  const day = (at: Date) => dayOfInstant(at, timeZone);
  const today = day(now);
  return rows.map((row) => {
    const isOut = (row.outNowPermille ?? 0) >= OUT_PERMILLE;
    const cutoff =
      row.p05 && row.p50 && row.p95
        ? { p5: day(row.p05), p50: day(row.p50), p95: day(row.p95) }
        : null;
    const tone = packTone({
      isOut,
      daysToLikely: cutoff && dayNumber(cutoff.p50) - dayNumber(today),
    });
    const share = row.shareLeftPermille === null ? null : row.shareLeftPermille / 1000;
    return {
      ...{ tag: row.tag, name: row.name, site: row.siteName, siteCode: row.siteCode },
      model: row.modelName,
      pack: row.designation
        ? packLabel(row.series ?? 1, row.parallel ?? 1, row.designation)
        : "no pack",
      disc: row.packId ? waneDisc({ share, isOut, tone, locale }) : null,
      window: cutoff && formatWindow(cutoff, locale, today),
      reading:
        row.readAt && row.readMv !== null
          ? `${formatVolts(row.readMv, locale)} · ${formatDay(day(row.readAt), locale, { today })}`
          : NOTHING,
      state: STATE_WORDS[row.state] ?? row.state,
    };
  });
}

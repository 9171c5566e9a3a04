import type { IsoDay } from "@/lib/units";
import { dayFromNumber, dayNumber, dayOfInstant } from "./calendar-days";
import { type CutoffDays, formatDay, formatWindow, type WindowLabel } from "./format-day";
import { formatMoney } from "./format-quantity";
import { NOTHING, type Presentation } from "./locale";
import { type SpanStripModel, spanStrip } from "./span-strip";
import { type StripHeadModel, stripHead } from "./strip-head";
import { type TimeAxis, timeAxis } from "./time-axis";
import { packTone, SOON_DAYS } from "./tone";
import { type WaneDiscModel, waneDisc } from "./wane-disc";

/** A pack counts as out when it is more likely than not that its device has stopped. */
export const OUT_PERMILLE = 500;

const DAYS_BEFORE = 62;
const DAYS_AFTER = 206;

export interface HorizonRowInput {
  readonly packId: string;
  readonly tag: string;
  readonly assetName: string;
  readonly siteName: string;
  readonly series: number;
  readonly parallel: number;
  readonly designation: string;
  readonly installedAt: Date;
  readonly p05: Date | null;
  readonly p50: Date | null;
  readonly p95: Date | null;
  readonly shareLeftPermille: number | null;
  readonly outNowPermille: number | null;
  readonly staleSince: Date | null;
  readonly waitingCostMinorPerWeek: number | null;
  readonly roundId: string | null;
  readonly visitDay: IsoDay | null;
  readonly roundState: string | null;
  readonly technicianName: string | null;
  readonly readAt: readonly Date[] | null;
}

export interface HorizonRowModel {
  readonly key: string;
  readonly tag: string;
  readonly asset: string;
  readonly site: string;
  readonly pack: string;
  readonly disc: WaneDiscModel;
  readonly strip: SpanStripModel;
  readonly window: Omit<WindowLabel, "text"> | null;
  readonly stale: boolean;
  readonly waiting: string;
  readonly visit: { readonly label: string; readonly href: string | null };
}

/** "2s · LR20", "2s2p · LR6", "1s · ER34615": how many cells in series and beside each other. */
export function packLabel(series: number, parallel: number, designation: string): string {
  return `${series}s${parallel > 1 ? `${parallel}p` : ""} · ${designation}`;
}

/** The axis that all strips of the horizon share: two months back, seven ahead. */
export function horizonAxis(today: IsoDay, locale: string, widthPx: number): TimeAxis {
  const day = dayNumber(today);
  return timeAxis({
    from: dayFromNumber(day - DAYS_BEFORE),
    to: dayFromNumber(day + DAYS_AFTER),
    widthPx,
    locale,
  });
}

/** The head above the strips, from each coming week's mean and variance of cut-offs. */
export function horizonHead(
  axis: TimeAxis,
  today: IsoDay,
  locale: string,
  weeks: readonly { week: number; mean: number; variance: number }[],
): StripHeadModel {
  const day = dayNumber(today);
  return stripHead({
    axis,
    today,
    locale,
    soonUntil: dayFromNumber(day + 14),
    weeks: weeks.map(({ week, mean, variance }) => {
      // A week's count is a sum of many independent chances: near normal, never below none.
      const spread = 1.645 * Math.sqrt(variance);
      const from = dayFromNumber(day + 7 * week);
      return { from, expected: mean, low: Math.max(0, mean - spread), high: mean + spread };
    }),
  });
}

/** One row of the horizon in finished words and marks. */
export function horizonRow(
  row: HorizonRowInput,
  axis: TimeAxis,
  today: IsoDay,
  presentation: Presentation,
): HorizonRowModel {
  const { locale, timeZone } = presentation;
  const day = (at: Date) => dayOfInstant(at, timeZone);
  const isOut = (row.outNowPermille ?? 0) >= OUT_PERMILLE;
  const share = row.shareLeftPermille === null ? null : row.shareLeftPermille / 1000;
  const cutoff = cutoffDays(row, day);
  const daysToLikely = cutoff && dayNumber(cutoff.p50) - dayNumber(today);
  const tone = packTone({ isOut, daysToLikely, soonWithinDays: SOON_DAYS });
  const published = row.roundState !== null && row.roundState !== "proposed";
  return {
    key: row.packId,
    tag: row.tag,
    asset: row.assetName,
    // Many assets are named after their site: it is not said twice.
    site: row.assetName.includes(row.siteName) ? "" : row.siteName,
    pack: packLabel(row.series, row.parallel, row.designation),
    disc: waneDisc({ share, isOut, tone, locale }),
    strip: spanStrip({
      ...{ axis, today, cutoff, tone, locale },
      subject: row.tag,
      datesBeside: true,
      installed: day(row.installedAt),
      ended: null,
      readings: (row.readAt ?? []).map(day),
      visits: row.visitDay ? [{ day: row.visitDay, published }] : [],
    }),
    window: cutoff && windowWords(cutoff, locale, today),
    stale: row.staleSince !== null,
    waiting: waitingWords(row.waitingCostMinorPerWeek, presentation),
    visit: visitWords(row, published, today, locale),
  };
}

function cutoffDays(row: HorizonRowInput, day: (at: Date) => IsoDay): CutoffDays | null {
  if (!row.p05 || !row.p50 || !row.p95) return null;
  return { p5: day(row.p05), p50: day(row.p50), p95: day(row.p95) };
}

function windowWords(cutoff: CutoffDays, locale: string, today: IsoDay) {
  const { from, likely, to } = formatWindow(cutoff, locale, today);
  return { from, likely, to };
}

function waitingWords(minor: number | null, presentation: Presentation): string {
  // Nothing is lost by waiting a week yet.
  if (minor === null || minor === 0) return NOTHING;
  return formatMoney(minor, presentation, { whole: true, per: "wk" });
}

function visitWords(
  row: HorizonRowInput,
  published: boolean,
  today: IsoDay,
  locale: string,
): HorizonRowModel["visit"] {
  if (!row.visitDay) return { label: NOTHING, href: null };
  const day = formatDay(row.visitDay, locale, { weekday: true, today });
  const label = published ? `${day} · ${row.technicianName ?? ""}` : `proposed · ${day}`;
  return { label, href: `/rounds?round=${row.roundId ?? ""}` };
}

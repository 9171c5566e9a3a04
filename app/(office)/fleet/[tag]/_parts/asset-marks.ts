import { axisDay, dayFromNumber, dayNumber, dayOfInstant } from "@/lib/present/calendar-days";
import { formatDay, formatDaysAway, formatWindow } from "@/lib/present/format-day";
import { formatVolts } from "@/lib/present/format-quantity";
import { formatPercentRange } from "@/lib/present/format-share";
import { OUT_PERMILLE, packLabel } from "@/lib/present/horizon";
import { spanStrip, stripScale } from "@/lib/present/span-strip";
import { timeAxis } from "@/lib/present/time-axis";
import { packTone, type Tone } from "@/lib/present/tone";
import { voltageChart } from "@/lib/present/voltage-chart";
import { waneDisc } from "@/lib/present/wane-disc";
import type { Explanation } from "@/lib/usecases/explain-forecast";
import type { AssetView } from "@/lib/usecases/read-asset";

const AXIS_PX = 1180;

/** The pack in an asset as marks and words; null when there is none. */
export function assetMarks(view: AssetView, explanation: Explanation | null) {
  const { pack, forecast, organisation, now, asset } = view;
  if (!pack) return null;
  const { locale, timeZone } = organisation;
  const day = (at: Date) => dayOfInstant(at, timeZone);
  const today = day(now);
  const cutoff = forecast && {
    p5: day(forecast.p05),
    p50: day(forecast.p50),
    p95: day(forecast.p95),
  };
  const isOut = (forecast?.outNowPermille ?? 0) >= OUT_PERMILLE;
  const tone = packTone({
    isOut,
    daysToLikely: cutoff && dayNumber(cutoff.p50) - dayNumber(today),
  });
  const share = forecast ? forecast.shareLeftPermille / 1000 : null;
  return {
    label: packLabel(pack.series, pack.parallel, pack.designation),
    disc: waneDisc({ share, isOut, tone, locale }),
    shareRange: forecast
      ? formatPercentRange(
          forecast.shareLeftLowPermille / 1000,
          forecast.shareLeftHighPermille / 1000,
          locale,
        )
      : null,
    window: cutoff && formatWindow(cutoff, locale, today),
    away: cutoff && formatDaysAway(cutoff.p50, today),
    since: formatDay(day(pack.installedAt), locale, { today }),
    tone,
    stale: Boolean(forecast?.staleSince),
    ...timeMarks(view, explanation, { tone, cutoff, today }),
    cutoffVolts: formatVolts(asset.cutoffMv, locale),
  };
}

type Cutoff = { p5: string; p50: string; p95: string } | null;

/** Strip and voltages on one axis, from the install to a little past the window. */
function timeMarks(
  view: AssetView,
  explanation: Explanation | null,
  { tone, cutoff, today }: { tone: Tone; cutoff: Cutoff; today: string },
) {
  const { pack, readings, asset, organisation, visits } = view;
  const { locale, timeZone } = organisation;
  const installed = dayOfInstant(pack?.installedAt ?? view.now, timeZone);
  const from = dayNumber(installed) - 14;
  const ahead = Math.max(dayNumber(today) + 60, cutoff ? dayNumber(cutoff.p95) + 21 : 0);
  // A window years ahead would press all that is known into a corner; its middle must show.
  const enough = 3 * (dayNumber(today) - from) + dayNumber(today) + 120;
  const to = Math.max(Math.min(ahead, enough), cutoff ? dayNumber(cutoff.p50) + 45 : 0);
  const axis = timeAxis({
    from: dayFromNumber(from),
    to: dayFromNumber(to),
    widthPx: AXIS_PX,
    locale,
  });
  const booked = visits.filter((v) => v.day >= today && v.kind === "swap");
  const strip = spanStrip({
    ...{ axis, today, tone, locale, installed, ended: null, cutoff, subject: asset.tag },
    readings: readings.map((r) => dayOfInstant(r.at, timeZone)),
    visits: booked.map((v) => ({ day: v.day, published: v.roundState !== "proposed" })),
  });
  const chart = voltageChart({
    ...{ axis, today, locale, cutoffMv: asset.cutoffMv, installs: [installed] },
    readings: readings.map((r) => ({
      day: axisDay(r.at, timeZone),
      mv: r.correctedMv ?? r.millivolts,
      kind: r.kind === "loaded" ? "loaded" : "resting",
      doubtful: r.doubt !== null || r.verdict === "set_aside",
      label: `${formatVolts(r.millivolts, locale)} ${r.kind === "loaded" ? "under load" : "resting"}, ${formatDay(dayOfInstant(r.at, timeZone), locale)}`,
    })),
    expected: (explanation?.expected ?? []).map(({ at, ...mv }) => ({
      ...mv,
      day: axisDay(at, timeZone),
    })),
  });
  return { scale: stripScale(axis, today), strip, chart };
}

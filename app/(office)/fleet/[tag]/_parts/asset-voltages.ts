import { dayShift } from "@/lib/present/day-shift";
import {
  formatCurrent,
  formatTemperature,
  formatVoltBand,
  formatVolts,
} from "@/lib/present/format-quantity";
import { formatPercent } from "@/lib/present/format-share";
import { formatInstant } from "@/lib/present/format-time";
import { NOTHING } from "@/lib/present/locale";
import { readingReason, readingSource } from "@/lib/present/reading-words";
import type { AssetView } from "@/lib/usecases/read-asset";

export interface VoltageRow {
  readonly id: string;
  readonly when: string;
  readonly volts: string;
  readonly condition: string;
  readonly expected: string;
  readonly counts: string;
  /** How far it alone moved the likely date; empty where that was not worked out. */
  readonly moved: string;
  readonly remark: string;
  readonly by: string;
}

/** The pack's voltages, newest first, with how much each counted in the forecast and why. */
export function voltageRows(
  { readings, forecast, organisation }: AssetView,
  moved: Readonly<Record<string, number>>,
): VoltageRow[] {
  const { locale } = organisation;
  const weights = new Map((forecast?.weights ?? []).map((w) => [w.readingId, w]));
  return readings
    .map((r) => {
      const weight = weights.get(r.id);
      const load = r.loadUa ? ` at ${formatCurrent(r.loadUa, locale)}` : "";
      const air = r.temperatureDc === null ? "" : `, ${formatTemperature(r.temperatureDc, locale)}`;
      return {
        id: r.id,
        when: formatInstant(r.at, organisation),
        volts: formatVolts(r.millivolts, locale),
        condition: `${r.kind === "loaded" ? `under load${load}` : "resting"}${air}`,
        expected: weight
          ? formatVoltBand(Math.max(0, weight.expectedLowMv), weight.expectedHighMv, locale)
          : NOTHING,
        counts: weight
          ? `${formatPercent(weight.weight, locale)} · ${readingReason(weight.reason)}`
          : NOTHING,
        moved: r.id in moved ? dayShift(moved[r.id] ?? 0) : NOTHING,
        remark: remarkOf(r, locale),
        by: r.personName ?? r.apiKeyName ?? readingSource(r.source),
      };
    })
    .reverse();
}

function remarkOf(r: AssetView["readings"][number], locale: string): string {
  const verdict =
    r.verdict === "corrected" && r.correctedMv !== null
      ? `corrected to ${formatVolts(r.correctedMv, locale)}`
      : r.verdict === "set_aside"
        ? "set aside"
        : r.verdict === "confirmed"
          ? "confirmed"
          : "";
  const doubt = r.doubt && !r.verdict ? `unlikely: ${r.doubt}` : "";
  return [verdict, doubt, r.verdictNote ?? "", r.note].filter(Boolean).join(" · ");
}

import { formatCurrent } from "@/lib/present/format-quantity";
import { formatNumber } from "@/lib/present/locale";
import { averageUa, peakUa } from "@/lib/present/duty-cycle";
import type { AssetView } from "@/lib/usecases/read-asset";

/** What the forecast rests on in one line: "3 resting readings, measured draw 118 µA, 41 packs". */
export function basisLine({ forecast, draws, model, organisation }: AssetView): string | null {
  if (!forecast) return null;
  const { locale } = organisation;
  const { basis } = forecast;
  const counted = (n: number, one: string, many: string) =>
    n > 0 ? `${formatNumber(n, locale)} ${n === 1 ? one : many}` : "";
  const measured = basis.measuredDraw ? draws[0] : undefined;
  const parts = [
    counted(basis.restingReadings ?? 0, "resting reading", "resting readings"),
    counted(basis.loadedReadings ?? 0, "reading under load", "readings under load"),
    measured
      ? `measured draw ${formatCurrent(measured.averageUa, locale)}`
      : `duty cycle of ${formatCurrent(averageUa(model?.states ?? []), locale)}`,
    counted(basis.fleetPacks ?? 0, "finished pack like this one", "finished packs like this one"),
  ];
  return parts.filter(Boolean).join(", ");
}

/** What the forecast rests on, one plain sentence each. */
export function basisSentences({
  forecast,
  draws,
  model,
  organisation,
  pack,
}: AssetView): string[] {
  const { locale } = organisation;
  if (!pack) return [];
  if (!forecast) return ["No forecast yet: the worker makes one within a minute."];
  const { basis } = forecast;
  const [measured] = draws;
  const duty = model?.states ?? [];
  return [
    voltageSentence(basis.restingReadings ?? 0, basis.loadedReadings ?? 0, locale),
    basis.doubtfulReadings
      ? `${formatNumber(basis.doubtfulReadings, locale)} of them hardly count, because they do not fit the curve of such a pack.`
      : "",
    basis.measuredDraw && measured
      ? `The draw was measured on this asset: ${formatCurrent(measured.averageUa, locale)} on average. It stands in for the model's duty cycle.`
      : `The draw comes from the duty cycle of ${model?.name ?? "its model"}: ${formatCurrent(averageUa(duty), locale)} on average, ${formatCurrent(peakUa(duty), locale)} at the peak.`,
    `The voltages say it draws ${formatCurrent(forecast.drawUa, locale)} now.`,
    basis.fleetPacks
      ? `${formatNumber(basis.fleetPacks, locale)} finished packs like this one say how far cells and devices stray from their data sheets.`
      : "Nothing has been learned from finished packs like this one yet: the data sheet's figures stand, with a wide range.",
  ].filter(Boolean);
}

function voltageSentence(resting: number, loaded: number, locale: string): string {
  if (resting + loaded === 0) return "No voltage has been logged yet, so only time and draw count.";
  const parts = [
    resting > 0 ? `${formatNumber(resting, locale)} resting` : "",
    loaded > 0 ? `${formatNumber(loaded, locale)} under load` : "",
  ].filter(Boolean);
  return `Voltages logged: ${parts.join(" and ")}.`;
}

/**
 * What single pieces of evidence did to a forecast: the same forecast made with and without one,
 * everything else and the day of the forecast being equal.
 */
import type { EpochDays } from "../units";
import { forecastPack } from "./forecast";
import type { Forecast, ForecastInput, PackEvent, PackReading } from "./pack";

export type Evidence =
  | { readonly kind: "reading"; readonly at: EpochDays; readonly reading: PackReading }
  | { readonly kind: "measured-draw"; readonly at: EpochDays }
  | { readonly kind: "event"; readonly at: EpochDays; readonly event: PackEvent };

export interface Moved {
  readonly evidence: Evidence;
  /** Likely day (median) without it and with it, and the days between: negative is earlier. */
  readonly without: EpochDays;
  readonly likely: EpochDays;
  readonly days: number;
}

/**
 * The last piece of evidence and how far it moved the likely day; null when nothing is known but
 * the installation. That a device reports is heard every day and is no piece by itself.
 * @param measuredAt when the measured draw was taken; null: there is none
 */
export function lastMoved(
  input: ForecastInput,
  forecast: Forecast,
  measuredAt: EpochDays | null,
): Moved | null {
  const evidence = lastEvidence(input, measuredAt);
  if (!evidence) return null;
  const without = forecastPack(withoutEvidence(input, evidence)).quantiles.p50;
  const likely = forecast.quantiles.p50;
  return { evidence, without, likely, days: likely - without };
}

/** How far each reading moved the likely day, by its id: the forecast with less that without it. */
export function movedByReading(
  input: ForecastInput,
  forecast: Forecast,
  readingIds: readonly string[],
): ReadonlyMap<string, number> {
  return new Map(
    readingIds.map((id) => {
      const readings = input.readings.filter((r) => r.id !== id);
      const { p50 } = forecastPack({ ...input, readings }).quantiles;
      return [id, forecast.quantiles.p50 - p50];
    }),
  );
}

function lastEvidence(input: ForecastInput, measuredAt: EpochDays | null): Evidence | null {
  const pieces: Evidence[] = [
    ...input.readings
      .filter((r) => r.at >= input.pack.installedAt && r.at <= input.now)
      .map((reading): Evidence => ({ kind: "reading", at: reading.at, reading })),
    ...input.events
      .filter((e) => e.kind !== "reporting" && e.at <= input.now)
      .map((event): Evidence => ({ kind: "event", at: event.at, event })),
  ];
  if (input.pack.measuredDraw && measuredAt !== null) {
    pieces.push({ kind: "measured-draw", at: measuredAt });
  }
  return pieces.sort((a, b) => a.at - b.at).at(-1) ?? null;
}

function withoutEvidence(input: ForecastInput, evidence: Evidence): ForecastInput {
  switch (evidence.kind) {
    case "reading":
      return { ...input, readings: input.readings.filter((r) => r.id !== evidence.reading.id) };
    case "event":
      return { ...input, events: input.events.filter((e) => e !== evidence.event) };
    case "measured-draw":
      return { ...input, pack: { ...input.pack, measuredDraw: null } };
  }
}

/**
 * What a voltage says, computed on the phone: the battery core on what the phone carries. Loaded
 * only with the pages that need it.
 */
import {
  type Chemistry,
  expectedVoltage,
  type Forecast,
  type ForecastInput,
  forecastPack,
} from "@/lib/battery";
import type { DayAsset, DayPack } from "@/lib/sync/day-pack";
import { fromEpochDays } from "@/lib/units";

const NEW_READING = "this-reading";

export interface MeasuredVoltage {
  readonly millivolts: number;
  readonly kind: "resting" | "loaded";
  readonly loadUa: number | null;
  readonly temperatureDc: number | null;
}

export interface CutoffWindow {
  readonly p05: Date;
  readonly p50: Date;
  readonly p95: Date;
}

export interface PlateReading {
  /** What was expected before the reading was seen. */
  readonly expected: { readonly lowMv: number; readonly highMv: number };
  readonly before: CutoffWindow;
  readonly after: CutoffWindow;
  readonly shareLeft: Forecast["shareLeft"];
  /** "fits", "doubtful", "passivation", "before-install" or "impossible". */
  readonly reason: string;
}

/** The battery core's input for the pack in an asset; null when there is none, or no duty. */
export function inputFor(day: DayPack, asset: DayAsset, nowDay: number): ForecastInput | null {
  const { pack } = asset;
  const model = day.models.find((candidate) => candidate.id === asset.modelId);
  const cell = day.cellTypes.find((candidate) => candidate.id === pack?.cellTypeId);
  const monthlyMeanDc = day.climates[asset.climate];
  if (!pack || !model || !cell || !monthlyMeanDc) return null;
  return {
    pack: {
      cell: { ...cell.spec, chemistry: cell.spec.chemistry as Chemistry },
      series: pack.series,
      parallel: pack.parallel,
      cutoffMv: model.cutoffMv,
      duty: model.duty,
      measuredDraw: pack.measuredDraw,
      monthlyMeanDc,
      madeAt: pack.madeDay,
      installedAt: pack.installedDay,
    },
    readings: pack.readings.map(({ atDay: at, ...reading }) => ({ ...reading, at })),
    events: pack.events.map(({ atDay: at, kind, lastAliveDay }) =>
      lastAliveDay === null ? { at, kind } : { at, kind, lastAliveAt: lastAliveDay },
    ),
    prior: null,
    now: nowDay,
  };
}

/** Where a voltage of this kind is expected now, before one is typed. */
export function expectedBand(
  input: ForecastInput,
  query: Omit<MeasuredVoltage, "millivolts">,
): { lowMv: number; highMv: number } | null {
  const [band] = expectedVoltage(input, [input.now], query);
  return band ? { lowMv: band.lowMv, highMv: band.highMv } : null;
}

/** What this voltage means and how it moves the window. */
export function readPlate(input: ForecastInput, measured: MeasuredVoltage): PlateReading | null {
  const before = forecastPack(input);
  const reading = { ...measured, id: NEW_READING, at: input.now, accuracyMv: null };
  const after = forecastPack({ ...input, readings: [...input.readings, reading] });
  const weight = after.weights.find((candidate) => candidate.readingId === NEW_READING);
  if (!weight) return null;
  return {
    expected: { lowMv: weight.expectedLowMv, highMv: weight.expectedHighMv },
    before: windowOf(before),
    after: windowOf(after),
    shareLeft: after.shareLeft,
    reason: weight.reason,
  };
}

function windowOf({ quantiles }: Forecast): CutoffWindow {
  return {
    p05: fromEpochDays(quantiles.p05),
    p50: fromEpochDays(quantiles.p50),
    p95: fromEpochDays(quantiles.p95),
  };
}

/**
 * The product's forecasts over the bench's records: one pack's input as the office knows it, and
 * what finished packs teach, put together as the product does it.
 */
import {
  CDF_PROBABILITIES,
  chanceOutBy,
  type FinishedHistory,
  type FleetLesson,
  type FleetPrior,
  type Forecast,
  type ForecastInput,
  forecastPack,
  learnFleet,
  type PackEvent,
} from "@/lib/battery";
import { interpolate } from "@/lib/stats/interpolate";
import { groupBy } from "@/lib/usecases/forecast-input";
import { catalogueCell } from "../../simulate/scenario/cell-catalogue";
import { modelByCode } from "../../simulate/scenario/device-models";
import type { BenchField, BenchPack } from "./field";
import type { Fleet } from "./fleet";

/**
 * A forecast this old is made anew, as is one with news. One whose pack may stop soon is made
 * anew sooner; in between it is only told that the device still reports. (The product makes all
 * of them anew every night.)
 */
const OLD_DAYS = 63;
const NEAR_DAYS = 45;
const RECENT_DAYS = 13;
/** The fleet's lessons are drawn again so often; the product does it when a pack has come out. */
const LEARN_DAYS = 91;
/** As lib/usecases/fleet-priors.ts has it. */
const OF_EACH_MODEL = 200;

function modelOf(tag: string) {
  return modelByCode(tag.split("-")[0] ?? "");
}

function cohortOf(pack: BenchPack): string {
  return `${modelOf(pack.tag).code} ${pack.designation}`;
}

function eventsOf(field: BenchField, pack: BenchPack, now: number): PackEvent[] {
  const changes = (field.drawChanges.get(pack.tag) ?? [])
    .filter((at) => at >= pack.installedAt && at <= now)
    .map((at): PackEvent => ({ at, kind: "draw-changed" }));
  const { silence } = pack;
  if (!silence || silence.knownAt > now) {
    const heard = Math.max(pack.installedAt, Math.min(now - 0.02, silence?.lastAliveAt ?? now));
    return [...changes, { at: heard, kind: "reporting" }];
  }
  const at = Math.min(now, Math.max(silence.at, pack.installedAt));
  return [...changes, { at, kind: "stopped", lastAliveAt: silence.lastAliveAt }];
}

function packSpec({ monthlyMeanDc }: Fleet, pack: BenchPack): ForecastInput["pack"] {
  const { series, parallel, cutoffMv, duty } = modelOf(pack.tag);
  const { make: _, ...cell } = catalogueCell(pack.designation);
  return {
    cell,
    series,
    parallel,
    cutoffMv,
    duty,
    measuredDraw: null,
    monthlyMeanDc,
    madeAt: pack.madeAt,
    installedAt: pack.installedAt,
  };
}

/** The quantiles of a forecast once it is known that the device runs on a later day. */
function stillRunning(forecast: Forecast, now: number): readonly number[] {
  const days = forecast.cdfDays;
  const past = chanceOutBy(forecast, now);
  if (days[0]! > now || past > 0.9) return days;
  return CDF_PROBABILITIES.map((p) =>
    Math.max(now, interpolate(CDF_PROBABILITIES, days, past + p * (1 - past))),
  );
}

/** Keeps a forecast for every pack, made anew where that could matter. */
export class ForecastDesk {
  private readonly kept = new Map<string, { at: number; readings: number; forecast: Forecast }>();
  private lesson: FleetLesson | null = null;
  private learnedAt = -Infinity;

  constructor(private readonly field: BenchField) {}

  /** The forecast as it stands on a morning. */
  forecast(pack: BenchPack, now: number): Forecast {
    const kept = this.kept.get(pack.key);
    if (kept && kept.readings === pack.readings.length && !this.isPressing(pack, kept, now)) {
      return { ...kept.forecast, cdfDays: stillRunning(kept.forecast, now) };
    }
    const forecast = forecastPack({
      pack: packSpec(this.field.fleet, pack),
      readings: pack.readings,
      events: eventsOf(this.field, pack, now),
      prior: this.prior(pack, now),
      now,
    });
    this.kept.set(pack.key, { at: now, readings: pack.readings.length, forecast });
    return forecast;
  }

  private isPressing(
    pack: BenchPack,
    kept: { readonly at: number; readonly forecast: Forecast },
    now: number,
  ): boolean {
    if (this.field.isKnownSilent(pack.tag, now) || now - kept.at > OLD_DAYS) return true;
    return now - kept.at > RECENT_DAYS && kept.forecast.cdfDays[0]! < now + NEAR_DAYS;
  }

  private prior(pack: BenchPack, now: number): FleetPrior | null {
    if (!this.lesson || now - this.learnedAt >= LEARN_DAYS) {
      this.lesson = learnFleet(latestOf(this.field).map((one) => historyOf(this.field.fleet, one)));
      this.learnedAt = now;
    }
    const { chemistry } = catalogueCell(pack.designation);
    const changedAt = changedBefore(this.field, pack);
    return this.lesson.priorFor({
      deviceKey: pack.tag,
      cohort: cohortOf(pack),
      chemistry,
      changedAt,
    });
  }
}

/** When the device last changed before this pack went in. */
function changedBefore({ drawChanges }: BenchField, pack: BenchPack): number | null {
  return drawChanges.get(pack.tag)?.findLast((at) => at < pack.installedAt) ?? null;
}

/** The latest finished packs of each device model: as many as the product learns from. */
function latestOf({ finished }: BenchField): BenchPack[] {
  const byModel = groupBy(finished, (pack) => modelOf(pack.tag).code);
  return [...byModel.values()].flatMap((own) =>
    own.sort((a, b) => (b.removedAt ?? 0) - (a.removedAt ?? 0)).slice(0, OF_EACH_MODEL),
  );
}

function historyOf(fleet: Fleet, pack: BenchPack): FinishedHistory {
  const outAt = Math.min(pack.silence?.at ?? Infinity, pack.removedAt ?? Infinity);
  return {
    packKey: pack.key,
    deviceKey: pack.tag,
    cohort: cohortOf(pack),
    lot: null,
    pack: packSpec(fleet, pack),
    readings: pack.readings,
    outAt,
    ranOut: pack.silence !== null,
  };
}

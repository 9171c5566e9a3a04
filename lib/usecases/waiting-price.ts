import type { PackToForecast } from "@/db/queries/forecast-inputs";
import type { Organisation } from "@/db/queries/organisation";
import type { Forecast } from "@/lib/battery";
import { tripOf, waitingPack } from "@/lib/planning/outlook";
import { waitingCostPerWeek } from "@/lib/planning/waiting-cost";
import { toEpochDays } from "@/lib/units";
import type { ForecastCatalogue } from "./forecast-input";

export type WaitingPrices = Pick<
  Organisation,
  | "crewCostMinorPerHour"
  | "overtimeCostMinorPerHour"
  | "travelCostMinorPerKm"
  | "detourFactor"
  | "roadSpeedKmh"
>;

/** The largest sum the column holds; no week of silence is worth more to anybody. */
const MOST_MINOR = 2_000_000_000;

/** What one more week without a visit costs from now on: the order of the Horizon. */
export function waitingMinorPerWeek(
  catalogue: ForecastCatalogue,
  prices: WaitingPrices,
  pack: PackToForecast,
  forecast: Forecast,
  now: Date,
): number {
  const model = catalogue.models.get(pack.deviceModelId);
  const planning = {
    crewMinorPerHour: prices.crewCostMinorPerHour,
    overtimeMinorPerHour: prices.overtimeCostMinorPerHour,
    travelMinorPerKm: prices.travelCostMinorPerKm,
  };
  const trip = tripOf(pack, {
    prices: planning,
    depots: catalogue.depots,
    road: { detourFactor: prices.detourFactor, speedKmh: prices.roadSpeedKmh },
  });
  const waiting = waitingPack(
    {
      life: forecast.cdfDays,
      installedAt: toEpochDays(pack.installedAt),
      silenceMinorPerHour: pack.silenceCostMinorPerHour ?? model?.silenceCostMinorPerHour ?? 0,
      swapS: (model?.swapMinutes ?? 15) * 60,
      cellsMinor: pack.series * pack.parallel * (catalogue.cellPrices.get(pack.cellTypeId) ?? 0),
    },
    trip,
    planning,
  );
  const at = toEpochDays(now);
  return Math.min(MOST_MINOR, Math.round(waitingCostPerWeek(waiting, at, at)));
}

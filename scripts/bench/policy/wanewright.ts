/** The product itself, week by week, with nothing but its own records. */
import type { PlanningPack } from "@/lib/planning/fleet";
import { preparePlan } from "@/lib/planning/plan";
import { BEFORE_WORK, type BenchField } from "./field";
import type { BenchAsset } from "./fleet";
import { ForecastDesk } from "./forecasts";
import { roundsFor, weekInput } from "./rounds";
import type { Policy } from "./week";

function planningPack(
  field: BenchField,
  desk: ForecastDesk,
  asset: BenchAsset,
  now: number,
): PlanningPack {
  const pack = field.packOf(asset.tag);
  const forecast = desk.forecast(pack, now);
  return {
    packId: pack.key,
    assetId: asset.tag,
    tag: asset.tag,
    assetName: asset.tag,
    siteId: asset.siteId,
    life: forecast.cdfDays,
    installedAt: pack.installedAt,
    shareLeft: forecast.shareLeft.p50,
    silenceMinorPerHour: asset.silenceMinorPerHour,
    cellTypeId: asset.designation,
    designation: asset.designation,
    cells: asset.cells,
    cellsMinor: asset.cellsMinor,
    swapS: asset.model.swapMinutes * 60,
    readS: asset.model.readMinutes * 60,
    habitIntervalDays: asset.model.habitIntervalDays,
  };
}

/** Every pack as the planner sees it on a morning. */
export function planningPacks(field: BenchField, desk: ForecastDesk, now: number): PlanningPack[] {
  return [...field.fleet.assets.values()].map((asset) => planningPack(field, desk, asset, now));
}

/** Forecasts, outlooks and rounds of the product, planned every Monday for that week. */
export function wanewright(): Policy {
  const desks = new WeakMap<BenchField, ForecastDesk>();
  return {
    name: "wanewright",
    plan(field, monday) {
      const desk = desks.get(field) ?? new ForecastDesk(field);
      desks.set(field, desk);
      const packs = planningPacks(field, desk, monday + BEFORE_WORK);
      return roundsFor(preparePlan(weekInput(field, monday, packs)), monday);
    },
  };
}

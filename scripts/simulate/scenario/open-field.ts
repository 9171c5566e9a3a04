import type { Rng } from "../prng";
import { FEN_CLIMATE } from "../weather";
import { createWorld, type World } from "../world";
import { placeAssets, type ScenarioAsset, worldAsset } from "./assets";
import { CELL_MAKES } from "./cell-catalogue";
import { drawDistrict } from "./district";
import type { Field } from "./field";
import { emptyLog } from "./field-log";
import type { HistoryPlan } from "./history";
import { placeSites, type ScenarioSite } from "./sites";
import { planAbsences, type ScenarioTechnician } from "./staff";
import { openStores } from "./store-room";

const CADENCES = [30, 45, 60, 75, 90, 90, 120, 150, 200];

/** The weak delivery: 470 days before the end, about two thirds of what its make gives. */
function badLot(today: number) {
  return { designation: "LR6", fromDay: today - 470, capacityFactor: 0.68, leakFactor: 3 };
}

/** The coldest winter began in the year whose November lies about two years back. */
function coldWinter(today: number): Record<number, number> {
  const year = new Date((today - 660) * 86_400_000).getUTCFullYear();
  return { [year]: 3.5 };
}

function groupBySite(assets: readonly ScenarioAsset[]): Map<string, ScenarioAsset[]> {
  const grouped = new Map<string, ScenarioAsset[]>();
  for (const asset of assets) {
    const there = grouped.get(asset.siteCode) ?? [];
    there.push(asset);
    grouped.set(asset.siteCode, there);
  }
  return grouped;
}

function commissionDays(
  assets: readonly ScenarioAsset[],
  plan: HistoryPlan,
  rng: Rng,
): Map<string, number> {
  const inUse = assets.filter((a) => a.state !== "stored");
  return new Map(
    inUse.map((asset) => {
      const late = asset.state === "in_service" && rng.chance(0.1);
      const offset = late ? rng.int(300, 1_000) : rng.int(0, 290);
      return [asset.tag, plan.firstDay + offset];
    }),
  );
}

function openWorld(
  assets: readonly ScenarioAsset[],
  siteByCode: ReadonlyMap<string, ScenarioSite>,
  plan: HistoryPlan,
  rng: Rng,
): World {
  return createWorld(`${rng.fork("world").next()}`, {
    firstDay: plan.firstDay,
    climate: { ...FEN_CLIMATE, coldWinters: coldWinter(plan.today) },
    makes: CELL_MAKES,
    lots: [],
    assets: assets.map((a) => worldAsset(a, siteByCode.get(a.siteCode) as ScenarioSite)),
  });
}

/** Everything as it stands on the first morning: sites, devices without packs, empty stores. */
export function openField(
  technicians: readonly ScenarioTechnician[],
  plan: HistoryPlan,
  rng: Rng,
): { readonly field: Field; readonly assets: readonly ScenarioAsset[] } {
  const district = drawDistrict();
  const sites = placeSites(district, rng.fork("sites"));
  const siteByCode = new Map(sites.map((s) => [s.code, s]));
  const assets = placeAssets(sites, rng.fork("assets"));
  const inUse = assets.filter((a) => a.state !== "stored");
  const world = openWorld(inUse, siteByCode, plan, rng);
  const looks = rng.fork("looks");
  const retired = inUse.filter((a) => a.state === "retired");
  const field: Field = {
    world,
    district,
    sites,
    siteByCode,
    assetsAt: groupBySite(inUse),
    technicians,
    absences: planAbsences(technicians, plan.firstDay, plan.today, rng.fork("absences")),
    stores: openStores(world, badLot(plan.today), rng.fork("stores")),
    log: emptyLog(),
    rng: rng.fork("history"),
    commissionDay: commissionDays(inUse, plan, rng.fork("commission")),
    retireDay: new Map(retired.map((a) => [a.tag, plan.today - looks.int(60, 400)])),
    cadence: new Map(sites.map((s) => [s.code, looks.pick(CADENCES)])),
    nextLook: new Map(sites.map((s) => [s.code, plan.firstDay + looks.int(120, 360)])),
    noticedAt: new Map(),
    swapSoon: new Set(),
    letBe: new Set(),
    keptWaiting: new Set(),
  };
  return { field, assets };
}

/** What everybody knows of the district: sites, devices, crews, prices. Nothing hidden is in here. */
import type { CellSpec } from "@/lib/battery";
import type { PlanningPrices, PlanningSite, PlanningTechnician } from "@/lib/planning/fleet";
import type { RoadAssumption } from "@/lib/planning/travel";
import { groupBy } from "@/lib/usecases/forecast-input";
import type { ScenarioAsset } from "../../simulate/scenario/assets";
import { catalogueCell } from "../../simulate/scenario/cell-catalogue";
import type { ScenarioModel } from "../../simulate/scenario/device-model";
import { modelByCode } from "../../simulate/scenario/device-models";
import { toWgs84 } from "../../simulate/scenario/geometry";
import { isoDay, TIME_ZONE } from "../../simulate/scenario/local-time";
import type { Scenario } from "../../simulate/scenario/scenario";
import type { ScenarioSite } from "../../simulate/scenario/sites";
import { planAbsences, type ScenarioTechnician } from "../../simulate/scenario/staff";
import { createRng } from "../../simulate/prng";

export { TIME_ZONE };

/** The organisation's prices: what the product sets for a new one. */
export const PRICES: PlanningPrices = {
  crewMinorPerHour: 3800,
  overtimeMinorPerHour: 5700,
  travelMinorPerKm: 45,
};
export const ROAD: RoadAssumption = { detourFactor: 1.3, speedKmh: 45 };
const VAN_CELLS = 240;

export interface BenchAsset {
  readonly tag: string;
  readonly siteId: string;
  readonly model: ScenarioModel;
  readonly designation: string;
  readonly cell: CellSpec;
  /** Cells of a pack, their price, and what they are rated at together. */
  readonly cells: number;
  readonly cellsMinor: number;
  readonly packMah: number;
  readonly silenceMinorPerHour: number;
}

export interface Fleet {
  readonly seed: string;
  readonly assets: ReadonlyMap<string, BenchAsset>;
  readonly sites: ReadonlyMap<string, PlanningSite>;
  readonly assetsAt: ReadonlyMap<string, readonly BenchAsset[]>;
  readonly technicians: readonly PlanningTechnician[];
  readonly monthlyMeanDc: readonly number[];
}

export function assetOf(fleet: Fleet, tag: string): BenchAsset {
  const asset = fleet.assets.get(tag);
  if (!asset) throw new Error(`bench: no asset called ${tag}`);
  return asset;
}

/** A cell type as the register holds it. */
function cellSpec(designation: string): CellSpec {
  const { chemistry, nominalMv, rated, capacityTable, ...rest } = catalogueCell(designation);
  const { selfDischargePpmPerYear, resistanceMohm, maxPulseUa } = rest;
  const electrical = { selfDischargePpmPerYear, resistanceMohm, maxPulseUa };
  return { chemistry, nominalMv, rated, capacityTable, ...electrical };
}

function benchAsset(asset: ScenarioAsset): BenchAsset {
  const model = modelByCode(asset.modelCode);
  const cell = cellSpec(asset.designation);
  const cells = model.series * model.parallel;
  return {
    tag: asset.tag,
    siteId: asset.siteCode,
    model,
    designation: asset.designation,
    cell,
    cells,
    cellsMinor: cells * catalogueCell(asset.designation).unitCostMinor,
    packMah: cell.rated.capacityMah * model.parallel,
    silenceMinorPerHour: asset.silenceCostMinorPerHour ?? model.silenceCostMinorPerHour,
  };
}

/**
 * A site without its notice: plans here are made on the Monday of their own week, so that a site
 * that wants days of notice could never be visited, under any policy.
 */
function benchSite(site: ScenarioSite): PlanningSite {
  const [opens, closes] = site.hours ?? [0, 0];
  return {
    siteId: site.code,
    code: site.code,
    name: site.name,
    latitude: site.latitude,
    longitude: site.longitude,
    noticeDays: 0,
    hours: site.hours ? { opensS: opens * 60, closesS: closes * 60 } : null,
    closures: site.closure
      ? [
          {
            firstMonthDay: site.closure.first,
            lastMonthDay: site.closure.last,
            reason: site.closure.reason,
          },
        ]
      : [],
    tickets: site.tickets,
    keyCode: site.keyCode,
  };
}

function benchTechnicians(s: Scenario, seed: string, lastDay: number): PlanningTechnician[] {
  const staff = s.technicians;
  const absences = planAbsences(staff, s.today, lastDay, createRng(`${seed}/absences`));
  return staff.map((t: ScenarioTechnician): PlanningTechnician => {
    const depot = s.district.depots.find((d) => d.bank === t.bank);
    if (!depot) throw new Error(`bench: no depot on the ${t.bank} bank`);
    return {
      technicianId: t.key,
      name: t.key,
      crewId: t.crewKey,
      depot: toWgs84(depot.at),
      tickets: t.tickets,
      shifts: Object.entries(t.shifts).map(([weekday, [starts, ends]]) => ({
        weekday: Number(weekday),
        startsS: starts * 60,
        endsS: ends * 60,
      })),
      absences: absences
        .filter((a) => a.technicianKey === t.key)
        .map((a) => ({
          firstDay: isoDay(a.firstDay),
          lastDay: isoDay(a.lastDay),
          reason: a.reason,
        })),
      vanCells: VAN_CELLS,
      takenDays: [],
    };
  });
}

/** Whole sites in an order drawn by the seed, until so many assets are together. */
function chooseSites(s: Scenario, seed: string, count: number): Set<string> {
  const chosen = new Set<string>();
  let assets = 0;
  for (const site of createRng(`${seed}/sites`).shuffle(s.sites)) {
    const here = s.assets.filter((a) => a.siteCode === site.code && a.state === "in_service");
    if (assets >= count) break;
    if (here.length === 0) continue;
    chosen.add(site.code);
    assets += here.length;
  }
  return chosen;
}

/** The scenario's fleet, or a part of it that is spread over the district as the whole is. */
export function fleetOf(s: Scenario, seed: string, count: number, lastDay: number): Fleet {
  const chosen = chooseSites(s, seed, count);
  const assets = s.assets
    .filter((a) => a.state === "in_service" && chosen.has(a.siteCode))
    .map(benchAsset);
  return {
    seed,
    assets: new Map(assets.map((a) => [a.tag, a])),
    sites: new Map(
      s.sites.filter((site) => chosen.has(site.code)).map((site) => [site.code, benchSite(site)]),
    ),
    assetsAt: groupBy(assets, (a) => a.siteId),
    technicians: benchTechnicians(s, seed, lastDay),
    monthlyMeanDc: s.monthlyMeanDc,
  };
}

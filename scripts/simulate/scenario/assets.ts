import { createRng, type Rng } from "../prng";
import type { WorldAsset } from "../fleet-asset";
import { averageUa, peakUa, type ScenarioModel, type SiteKind } from "./device-model";
import { DEVICE_MODELS, modelByCode } from "./device-models";
import type { ScenarioSite } from "./sites";

export interface ScenarioAsset {
  readonly tag: string;
  readonly name: string;
  readonly siteCode: string;
  readonly modelCode: string;
  readonly state: "in_service" | "stored" | "retired";
  /** Cells this asset is given at each swap. */
  readonly designation: string;
  /** Overrides the model's cost of silence. */
  readonly silenceCostMinorPerHour: number | null;
  readonly note: string;
}

const MOST_AT_ONE_SITE = 4;
/** Kinds with the fewest models first, so that every site gets something. */
const ORDER: readonly SiteKind[] = [
  "mast",
  "culvert",
  "bank",
  "field",
  "gauge_house",
  "pump_house",
  "sluice",
];
const STORED = 12;
const RETIRED = 8;

interface Placing {
  readonly model: ScenarioModel;
  readonly site: ScenarioSite;
}

/** Shares out the models over the sites: one everywhere, then the rest where there is room. */
function placeModels(sites: readonly ScenarioSite[], rng: Rng): Placing[] {
  const left = new Map(DEVICE_MODELS.map((model) => [model, model.count]));
  const placed: Placing[] = [];
  const atSite = new Map<string, number>();
  const put = (model: ScenarioModel, site: ScenarioSite): void => {
    placed.push({ model, site });
    left.set(model, (left.get(model) ?? 0) - 1);
    atSite.set(site.code, (atSite.get(site.code) ?? 0) + 1);
  };
  for (const kind of ORDER) {
    for (const site of sites.filter((s) => s.kind === kind)) {
      const open = DEVICE_MODELS.filter(
        (m) => m.siteKinds.includes(kind) && (left.get(m) ?? 0) > 0,
      );
      const tickets = open.flatMap((m) => Array<ScenarioModel>(left.get(m) ?? 0).fill(m));
      if (tickets.length > 0) put(rng.pick(tickets), site);
    }
  }
  for (const model of DEVICE_MODELS) {
    const fitting = sites.filter((s) => model.siteKinds.includes(s.kind));
    for (let tries = 0; (left.get(model) ?? 0) > 0 && tries < 5_000; tries++) {
      const site = rng.pick(fitting);
      if ((atSite.get(site.code) ?? 0) < MOST_AT_ONE_SITE) put(model, site);
    }
  }
  return placed;
}

function stateOf(index: number, total: number): ScenarioAsset["state"] {
  if (index >= total - STORED) return "stored";
  return index >= total - STORED - RETIRED ? "retired" : "in_service";
}

/** About 1,200 assets in service, and a few stored or retired. */
export function placeAssets(sites: readonly ScenarioSite[], rng: Rng): ScenarioAsset[] {
  const placed = rng.shuffle(placeModels(sites, rng));
  const spare = Array.from({ length: STORED + RETIRED }, () => rng.pick(placed));
  const all = [...placed, ...spare];
  const numbers = new Map<string, number>();
  return all.map(({ model, site }, i) => {
    const number = (numbers.get(model.code) ?? 0) + 1;
    numbers.set(model.code, number);
    const second = model.cellTypes[1];
    const state = stateOf(i, all.length);
    return {
      tag: `${model.code}-${String(number).padStart(3, "0")}`,
      name: `${model.assetName}, ${site.name}`,
      siteCode: site.code,
      modelCode: model.code,
      state,
      designation: second && rng.chance(0.08) ? second : model.cellTypes[0],
      silenceCostMinorPerHour: rng.chance(0.05)
        ? model.silenceCostMinorPerHour * rng.int(2, 6)
        : null,
      note: state === "stored" ? "On the shelf at the depot." : "",
    };
  });
}

/** What the simulator has to know of an asset. */
export function worldAsset(asset: ScenarioAsset, site: ScenarioSite): WorldAsset {
  const model = modelByCode(asset.modelCode);
  return {
    key: asset.tag,
    averageUa: averageUa(model.duty),
    peakUa: peakUa(model.duty),
    cutoffMv: model.cutoffMv,
    series: model.series,
    parallel: model.parallel,
    seasonalShare: model.season.share,
    seasonalPeak: model.season.peak,
    exposureC: createRng(`exposure/${site.code}`).normal(0.3, 0.8),
  };
}

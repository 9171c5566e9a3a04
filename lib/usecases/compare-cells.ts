import { z } from "zod";
import { findAsset } from "@/db/queries/assets";
import { type CellTypeRow, listCellTypes } from "@/db/queries/cell-types";
import { findDeviceModel } from "@/db/queries/device-models";
import { listDrawMeasurements } from "@/db/queries/draw-measurements";
import { loadDeviceEvents, loadForecastCatalogue } from "@/db/queries/forecast-inputs";
import { getOrganisation, type Organisation } from "@/db/queries/organisation";
import { findInstalledPack } from "@/db/queries/packs";
import { type ModelPlace, placesOfModel, siteOfAsset } from "@/db/queries/model-places";
import { notFound } from "@/lib/errors";
import { chooseCells } from "@/lib/planning/cell-choice";
import type { CandidateCell, DeviceAndPlace } from "@/lib/planning/cell-fit";
import { tripOf } from "@/lib/planning/outlook";
import { toEpochDays } from "@/lib/units";
import { arrangeCatalogue, climateOf, type ForecastCatalogue } from "./forecast-input";
import { fleetPriors } from "./fleet-priors";
import { type Deps, defineUseCase } from "./use-case";

const MEASURED_SD = 0.06;

/** Every cell type side by side for one asset, or for a device model at its usual site. */
export const compareCells = defineUseCase({
  name: "compare-cells",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.union([z.object({ tag: z.string().min(1) }), z.object({ modelId: z.uuid() })]),
  async run(deps, _actor, of) {
    const subject =
      "tag" in of ? await assetSubject(deps, of.tag) : await modelSubject(deps, of.modelId);
    const [organisation, rows, cellTypes] = await Promise.all([
      getOrganisation(deps.db),
      loadForecastCatalogue(deps.db),
      listCellTypes(deps.db),
    ]);
    const catalogue = arrangeCatalogue(rows);
    const { model, place, installed } = subject;
    const device: DeviceAndPlace = {
      ...{ series: model.series, parallel: model.parallel, cutoffMv: model.cutoffMv },
      ...{ duty: model.states, measuredDraw: subject.measuredDraw },
      monthlyMeanDc: climateOf(catalogue, place?.climateId ?? null),
    };
    const candidates = candidatesOf(catalogue, cellTypes, model.cells, installed);
    const choice = chooseCells(candidates, {
      ...{ device, now: toEpochDays(deps.now()) },
      visitMinor: visitMinor(organisation, catalogue, place, model.swapMinutes),
      priorOf: await priors(deps, catalogue, subject, candidates),
    });
    return { organisation, subject, device, choice };
  },
});
export type CellComparison = Awaited<ReturnType<typeof compareCells>>;

interface Subject {
  readonly tag: string | null;
  readonly assetId: string | null;
  readonly model: NonNullable<Awaited<ReturnType<typeof findDeviceModel>>>;
  readonly place: ModelPlace | null;
  readonly measuredDraw: DeviceAndPlace["measuredDraw"];
  /** Cell type that is in now. */
  readonly installed: string | null;
}

async function assetSubject(deps: Deps, tag: string): Promise<Subject> {
  const asset = await findAsset(deps.db, tag);
  const model = asset && (await findDeviceModel(deps.db, asset.deviceModelId));
  if (!asset || !model) throw notFound(`The asset ${tag}`);
  const [place, pack, [measured]] = await Promise.all([
    siteOfAsset(deps.db, asset.id),
    findInstalledPack(deps.db, asset.id),
    listDrawMeasurements(deps.db, asset.id),
  ]);
  const measuredDraw = measured ? { averageUa: measured.averageUa, relativeSd: MEASURED_SD } : null;
  return {
    tag,
    assetId: asset.id,
    model,
    place,
    measuredDraw,
    installed: pack?.cellTypeId ?? null,
  };
}

/** A model stands for its assets: the climate that most of them have, a site in their middle. */
async function modelSubject(deps: Deps, modelId: string): Promise<Subject> {
  const model = await findDeviceModel(deps.db, modelId);
  if (!model) throw notFound("The device model");
  const [place] = await placesOfModel(deps.db, modelId);
  const none = { tag: null, assetId: null, measuredDraw: null, installed: null };
  return { ...none, model, place: place ?? null };
}

function candidatesOf(
  catalogue: ForecastCatalogue,
  cellTypes: readonly CellTypeRow[],
  listed: readonly { readonly cellTypeId: string; readonly preferred: boolean }[],
  installed: string | null,
): CandidateCell[] {
  return cellTypes.flatMap((row): CandidateCell[] => {
    const spec = catalogue.cells.get(row.id);
    const own = listed.find((cell) => cell.cellTypeId === row.id);
    if (!spec || (row.retired && !own && row.id !== installed)) return [];
    const { id, designation, size, massMg, shelfLifeMonths, unitCostMinor } = row;
    const accepted = own !== undefined;
    const preferred = own?.preferred ?? false;
    return [
      { id, designation, size, spec, massMg, shelfLifeMonths, unitCostMinor, accepted, preferred },
    ];
  });
}

/** Work at a swap and the share of a round's drive that one stop pays. */
function visitMinor(
  prices: Organisation,
  catalogue: ForecastCatalogue,
  place: ModelPlace | null,
  swapMinutes: number,
): number {
  const work = (swapMinutes / 60) * prices.crewCostMinorPerHour;
  if (!place) return work;
  const { shareMinor } = tripOf(place, {
    prices: {
      crewMinorPerHour: prices.crewCostMinorPerHour,
      overtimeMinorPerHour: prices.overtimeCostMinorPerHour,
      travelMinorPerKm: prices.travelCostMinorPerKm,
    },
    depots: catalogue.depots,
    road: { detourFactor: prices.detourFactor, speedKmh: prices.roadSpeedKmh },
  });
  return work + shareMinor;
}

/** What finished packs of this device model in this climate taught, on each cell type. */
async function priors(
  deps: Deps,
  catalogue: ForecastCatalogue,
  subject: Subject,
  candidates: readonly CandidateCell[],
) {
  const member = (cellTypeId: string) => ({
    assetId: subject.assetId ?? "",
    deviceModelId: subject.model.id,
    cellTypeId,
    climateId: subject.place?.climateId ?? null,
    installedAt: deps.now(),
  });
  const events = subject.assetId ? await loadDeviceEvents(deps.db, [subject.assetId]) : [];
  const members = candidates.map((cell) => member(cell.id));
  const priorOf = await fleetPriors(deps.db, catalogue, members);
  return (cellId: string) => priorOf(member(cellId), events);
}

import { z } from "zod";
import {
  type FieldAssetRow,
  type FieldRoundRows,
  loadFieldAssets,
  loadFieldModels,
  loadFieldRounds,
  loadFieldSites,
  loadVanStock,
} from "@/db/queries/field-day";
import {
  loadDeviceEvents,
  loadForecastCatalogue,
  loadPacksToForecast,
  loadReadingsToForecast,
} from "@/db/queries/forecast-inputs";
import { getOrganisation } from "@/db/queries/organisation";
import { forbidden } from "@/lib/errors";
import { dayFromNumber, dayNumber, dayOfInstant } from "@/lib/present/calendar-days";
import { DAY_PACK_VERSION, type DayPack } from "@/lib/sync/day-pack";
import { assembleAssets, type PackParts } from "./field-day-assets";
import {
  assembleCellTypes,
  assembleModels,
  assembleRounds,
  assembleSites,
} from "./field-day-parts";
import { arrangeCatalogue, groupBy } from "./forecast-input";
import { neighboursWorth } from "./neighbours-worth";
import { type Deps, defineUseCase, type PersonActor } from "./use-case";

/** Yesterday, for what is still to be sent or looked up, and a week ahead. */
const DAYS_BACK = 1;
const DAYS_AHEAD = 7;

/**
 * Everything a technician's phone needs for its days without signal. A dispatcher may look at a
 * technician's; a technician sees their own only.
 */
export const readFieldDay = defineUseCase({
  name: "read-field-day",
  allow: { roles: ["administrator", "dispatcher", "technician"] },
  input: z.object({ technicianId: z.uuid().nullable().default(null) }),
  async run(deps, actor, given): Promise<DayPack> {
    if (actor.kind !== "person") throw forbidden();
    const technicianId = whose(actor, given.technicianId);
    const organisation = await getOrganisation(deps.db);
    const madeAt = deps.now();
    const today = dayNumber(dayOfInstant(madeAt, organisation.timeZone));
    const rounds = technicianId
      ? await loadFieldRounds(
          deps.db,
          technicianId,
          dayFromNumber(today - DAYS_BACK),
          dayFromNumber(today + DAYS_AHEAD),
        )
      : { rounds: [], stops: [], tasks: [] };
    const { name, locale, timeZone, currency, keepPhotoPosition } = organisation;
    const siteIds = [...new Set(rounds.stops.map((stop) => stop.siteId))];
    const [{ assets, ...things }, van, worth] = await Promise.all([
      loadThings(deps, rounds, madeAt),
      technicianId ? loadVanStock(deps.db, technicianId) : null,
      neighboursWorth(deps.db, madeAt, organisation.timeZone, siteIds),
    ]);
    return {
      version: DAY_PACK_VERSION,
      madeAt: madeAt.toISOString(),
      person: { id: actor.personId, name: actor.name },
      organisation: { name, locale, timeZone, currency, keepPhotoPosition },
      van,
      rounds: assembleRounds(rounds),
      assets: assets.map((asset) => ({ ...asset, worth: worth.get(asset.id) ?? null })),
      ...things,
    };
  },
});

function whose(actor: PersonActor, asked: string | null): string | null {
  if (asked === null || asked === actor.technicianId) return actor.technicianId;
  if (actor.roles.some((role) => role === "dispatcher" || role === "administrator")) return asked;
  throw forbidden("These are somebody else's rounds.");
}

async function loadThings(deps: Deps, { stops, tasks }: FieldRoundRows, now: Date) {
  const siteIds = [...new Set(stops.map((stop) => stop.siteId))];
  const assetIds = [...new Set(tasks.map((task) => task.assetId))];
  const rows = await loadFieldAssets(deps.db, siteIds, assetIds);
  const allSites = [...new Set([...siteIds, ...rows.map((row) => row.siteId)])];
  const modelIds = [...new Set(rows.map((row) => row.deviceModelId))];
  const [sites, models, parts] = await Promise.all([
    loadFieldSites(deps.db, allSites),
    loadFieldModels(deps.db, modelIds),
    loadParts(deps, rows, now),
  ]);
  const { assets, climates } = assembleAssets(rows, parts);
  const wanted = new Set([
    ...models.accepted.map((row) => row.cellTypeId),
    ...assets.flatMap((asset) => (asset.pack ? [asset.pack.cellTypeId] : [])),
  ]);
  return {
    sites: assembleSites(sites),
    assets,
    models: assembleModels(models, parts.catalogue),
    cellTypes: assembleCellTypes(wanted, parts.designations, parts.catalogue),
    climates,
  };
}

async function loadParts(deps: Deps, rows: readonly FieldAssetRow[], now: Date) {
  const packIds = rows.flatMap((row) => (row.packId ? [row.packId] : []));
  const assetIds = rows.map((row) => row.id);
  const some = packIds.length > 0;
  const [catalogueRows, packs, readings, events] = await Promise.all([
    loadForecastCatalogue(deps.db),
    some ? loadPacksToForecast(deps.db, packIds) : [],
    some ? loadReadingsToForecast(deps.db, packIds) : [],
    some ? loadDeviceEvents(deps.db, assetIds) : [],
  ]);
  const parts: PackParts = {
    catalogue: arrangeCatalogue(catalogueRows),
    packs: new Map(packs.map((pack) => [pack.packId, pack])),
    readings: groupBy(readings, (row) => row.packId),
    events: groupBy(events, (row) => row.assetId),
    now,
  };
  const designations = new Map(catalogueRows.cellTypes.map((row) => [row.id, row.designation]));
  return { ...parts, designations };
}

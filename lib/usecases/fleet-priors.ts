import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import {
  type DeviceEventRow,
  loadPacksToForecast,
  loadReadingsToForecast,
  type PackToForecast,
  type ReadingToForecast,
} from "@/db/queries/forecast-inputs";
import { finishedByChemistry, listFinishedPacks } from "@/db/queries/outcomes";
import {
  type Chemistry,
  type FinishedHistory,
  type FleetLesson,
  type FleetPrior,
  learnFleet,
} from "@/lib/battery";
import { toEpochDays } from "@/lib/units";
import {
  type ForecastCatalogue,
  forecastInputOf,
  groupBy,
  withoutFindings,
} from "./forecast-input";

interface Member {
  readonly assetId: string;
  readonly deviceModelId: string;
  readonly cellTypeId: string;
  readonly climateId: string | null;
}

interface Forecastable extends Member {
  readonly installedAt: Date;
}

/** Enough to know a model's packs by; older ones tell of older cells. */
const OF_EACH_MODEL = 200;
/** Packs whose voltages are read at a time. */
const BATCH = 500;

interface Learned {
  readonly version: string;
  readonly lesson: FleetLesson;
}

/** What was learned from each database, by chemistry, until another pack comes out. */
const LEARNED = new WeakMap<Kysely<Database>, Map<string, Learned>>();

/** What is known beforehand of a pack, given what happened to its device; null: nothing. */
export type PriorOf = (pack: Forecastable, events: readonly DeviceEventRow[]) => FleetPrior | null;

/** Packs alike: the same device model on the same cells in the same climate. */
function cohortOf(member: Member): string {
  return `${member.deviceModelId} ${member.cellTypeId} ${member.climateId ?? ""}`;
}

/**
 * What finished packs teach about these, learned from the latest packs of their chemistries that
 * came out: lives, voltage curves, ends. Learned anew when another pack has come out.
 */
export async function fleetPriors(
  db: Kysely<Database>,
  catalogue: ForecastCatalogue,
  packs: readonly Forecastable[],
): Promise<PriorOf> {
  const wanted = new Set(packs.map((pack) => chemistryOf(catalogue, pack)));
  const known = LEARNED.get(db) ?? new Map<string, Learned>();
  LEARNED.set(db, known);
  for (const { chemistry, version } of await finishedByChemistry(db)) {
    const stands = known.get(chemistry)?.version === version;
    if (stands || ![...wanted].some((one) => one === chemistry)) continue;
    const lesson = learnFleet(await loadHistories(db, catalogue, chemistry, null));
    known.set(chemistry, { version, lesson });
  }
  return priorFrom(catalogue, (chemistry) => known.get(chemistry)?.lesson);
}

/** What the packs that had come out by then taught: nothing that came out later is in it. */
export async function fleetPriorsBefore(
  db: Kysely<Database>,
  catalogue: ForecastCatalogue,
  before: Date,
): Promise<PriorOf> {
  const lessons = new Map<string, FleetLesson>();
  for (const { chemistry } of await finishedByChemistry(db)) {
    const histories = await loadHistories(db, catalogue, chemistry, before);
    lessons.set(chemistry, learnFleet(histories));
  }
  return priorFrom(catalogue, (chemistry) => lessons.get(chemistry));
}

function priorFrom(
  catalogue: ForecastCatalogue,
  lessonOf: (chemistry: Chemistry) => FleetLesson | undefined,
): PriorOf {
  return (pack, events) => {
    const chemistry = chemistryOf(catalogue, pack);
    if (!chemistry) return null;
    const changedAt = changedBefore(pack, events);
    const member = { deviceKey: pack.assetId, cohort: cohortOf(pack), chemistry, changedAt };
    return lessonOf(chemistry)?.priorFor(member) ?? null;
  };
}

function chemistryOf(catalogue: ForecastCatalogue, pack: Member): Chemistry | undefined {
  return catalogue.cells.get(pack.cellTypeId)?.chemistry;
}

/** The last change of the device before this pack went in; later ones are the filter's to hear. */
function changedBefore(pack: Forecastable, events: readonly DeviceEventRow[]): number | null {
  const changes = events.filter(
    ({ kind, at }) =>
      (kind === "firmware_changed" || kind === "device_replaced") && at <= pack.installedAt,
  );
  return changes.length > 0 ? Math.max(...changes.map(({ at }) => toEpochDays(at))) : null;
}

async function loadHistories(
  db: Kysely<Database>,
  catalogue: ForecastCatalogue,
  chemistry: string,
  before: Date | null,
): Promise<FinishedHistory[]> {
  const finished = await listFinishedPacks(db, chemistry, OF_EACH_MODEL, before);
  const histories: FinishedHistory[] = [];
  for (let from = 0; from < finished.length; from += BATCH) {
    const page = finished.slice(from, from + BATCH);
    const ids = page.map((row) => row.packId);
    const packs = groupBy(await loadPacksToForecast(db, ids, "removed"), (row) => row.packId);
    const readings = groupBy(await loadReadingsToForecast(db, ids), (row) => row.packId);
    for (const row of page) {
      const pack = packs.get(row.packId)?.[0];
      if (pack) histories.push(historyOf(catalogue, pack, readings.get(row.packId) ?? [], row));
    }
  }
  return histories;
}

function historyOf(
  catalogue: ForecastCatalogue,
  row: PackToForecast,
  readings: readonly ReadingToForecast[],
  { lotId, censored, endedAt }: { lotId: string | null; censored: boolean; endedAt: Date },
): FinishedHistory {
  // lives are told beside the duty cycle: a current measured since says nothing of them
  const unmeasured = { ...row, measuredAverageUa: null, lastHeardAt: null };
  const sheets = withoutFindings(catalogue);
  const input = forecastInputOf(sheets, unmeasured, readings, [], null, endedAt);
  return {
    packKey: row.packId,
    deviceKey: row.assetId,
    cohort: cohortOf(row),
    lot: lotId,
    pack: input.pack,
    readings: input.readings,
    outAt: toEpochDays(endedAt),
    ranOut: !censored,
  };
}

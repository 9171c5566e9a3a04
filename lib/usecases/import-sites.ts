import type { findNames, findSitesByCode } from "@/db/queries/bulk-register";
import type { SiteRecord } from "@/db/queries/sites";
import type { ImportRecord } from "@/lib/csv/read-records";
import { given, type ImportContext, type ImportOutcome, overlay } from "./import-outcome";
import { naturalId } from "./natural-id";

export interface SitePlan {
  readonly site: SiteRecord;
  readonly isNew: boolean;
  readonly changed: readonly string[];
  /** The row that tells of the site first. */
  readonly firstRow: number;
  /** Closed seasons to put in place of the old ones; null: not told. */
  readonly closures: readonly Season[] | null;
}

export interface Season {
  readonly id: string;
  readonly firstMonthDay: string;
  readonly lastMonthDay: string;
  readonly reason: string;
}

type Names = Awaited<ReturnType<typeof findNames>>;
type Known = Awaited<ReturnType<typeof findSitesByCode>>[number];

const SITE_KEYS = [
  ...["siteName", "latitude", "longitude", "crew", "climate", "notice", "opens", "closes"],
  ...["closed", "keyCode", "contactName", "contactEmail", "contactPhone", "hazards", "tickets"],
  "driveUp",
];

/** What the rows say about their sites, one plan a site; rows that contradict are refused. */
export function planSites(
  context: ImportContext,
  outcome: ImportOutcome,
  known: readonly Known[],
  names: Names,
  seasons: ReadonlyMap<string, readonly Omit<Season, "id">[]>,
): Map<string, SitePlan> {
  const before = new Map(known.map((site) => [site.code, site]));
  const plans = new Map<string, SitePlan>();
  for (const [code, rows] of bySite(context.records)) {
    const told = gather(rows, outcome);
    const changes = siteChanges(told, names, outcome, rows[0]?.row ?? 0);
    const old = before.get(code);
    if (!old && !(told.siteName && told.latitude !== undefined && told.longitude !== undefined)) {
      const message = `The site ${code} is new: give its name, latitude and longitude.`;
      for (const { row } of rows) outcome.refuse(row, "site", message);
      continue;
    }
    const { after, changed } = overlay(old ?? blankSite(code, context.deps.now()), changes);
    const closures = readClosures(told.closed, code, outcome, rows[0]?.row ?? 0);
    if (closures && seasonText(closures) !== seasonText(seasons.get(after.id) ?? [])) {
      changed.push("closed seasons");
    }
    plans.set(code, {
      ...{ changed, closures, isNew: old === undefined, firstRow: rows[0]?.row ?? 0 },
      site: { ...after, updatedAt: context.deps.now() },
    });
  }
  return plans;
}

function bySite(records: readonly ImportRecord[]): Map<string, ImportRecord[]> {
  const groups = new Map<string, ImportRecord[]>();
  for (const record of records) {
    const code = String(record.values.site);
    const group = groups.get(code);
    if (group) group.push(record);
    else groups.set(code, [record]);
  }
  return groups;
}

type Told = ReturnType<typeof given>;

/** The first row that fills a cell is believed; a later one that says otherwise is refused. */
function gather(rows: readonly ImportRecord[], outcome: ImportOutcome): Told {
  const told: Told = {};
  const toldBy: Record<string, number> = {};
  for (const record of rows) {
    for (const [key, value] of Object.entries(given(record))) {
      if (!SITE_KEYS.includes(key)) continue;
      if (told[key] === undefined) {
        told[key] = value;
        toldBy[key] = record.row;
      } else if (String(told[key]) !== String(value)) {
        const message = `Row ${toldBy[key]} says "${String(told[key])}" of the same site.`;
        outcome.refuse(record.row, key, message);
      }
    }
  }
  return told;
}

function siteChanges(told: Told, names: Names, outcome: ImportOutcome, row: number) {
  const id = (key: "crew" | "climate", list: readonly { id: string; name: string }[]) => {
    const name = told[key];
    if (name === undefined) return undefined;
    const found = list.find((one) => one.name.toLowerCase() === String(name).toLowerCase());
    if (!found) outcome.refuse(row, key, `There is no ${key} called ${String(name)}.`);
    return found?.id;
  };
  const text = (key: string) => (told[key] === undefined ? undefined : String(told[key]));
  const changes = {
    name: text("siteName"),
    latitude: told.latitude === undefined ? undefined : Number(told.latitude) / 1e7,
    longitude: told.longitude === undefined ? undefined : Number(told.longitude) / 1e7,
    crewId: id("crew", names.crews),
    climateId: id("climate", names.climates),
    noticeDays: told.notice === undefined ? undefined : Number(told.notice),
    ...{ opens: text("opens"), closes: text("closes"), keyCode: text("keyCode") },
    ...{ contactName: text("contactName"), contactEmail: text("contactEmail") },
    ...{ contactPhone: text("contactPhone"), driveUpNotes: text("driveUp") },
    hazards: told.hazards as string[] | undefined,
    tickets: told.tickets as string[] | undefined,
  };
  return Object.fromEntries(
    Object.entries(changes).filter(([, value]) => value !== undefined),
  ) as Partial<SiteRecord>;
}

const SEASON =
  /^((?:0[1-9]|1[0-2])-(?:[0-2]\d|3[01]))\s*(?:\.\.|to|until|\u2013)\s*((?:0[1-9]|1[0-2])-(?:[0-2]\d|3[01]))(?:\s+(.*))?$/;

/** "03-15..07-15 nesting season | 12-20..01-06": it may span New Year. */
function readClosures(
  told: unknown,
  code: string,
  outcome: ImportOutcome,
  row: number,
): Season[] | null {
  if (told === undefined) return null;
  return String(told)
    .split("|")
    .flatMap((part) => {
      const [, firstMonthDay, lastMonthDay, reason = ""] = SEASON.exec(part.trim()) ?? [];
      if (firstMonthDay && lastMonthDay) {
        const id = naturalId("closure", code, firstMonthDay, lastMonthDay);
        return [{ id, firstMonthDay, lastMonthDay, reason }];
      }
      outcome.refuse(row, "closed", `"${part.trim()}" is no season such as 03-15..07-01.`);
      return [];
    });
}

function seasonText(seasons: readonly Omit<Season, "id">[]): string {
  return seasons
    .map((s) => `${s.firstMonthDay} ${s.lastMonthDay} ${s.reason}`)
    .sort()
    .join("|");
}

function blankSite(code: string, updatedAt: Date): SiteRecord {
  return {
    ...{ id: naturalId("site", code), code, name: "", latitude: 0, longitude: 0, updatedAt },
    ...{ crewId: null, climateId: null, noticeDays: 0, opens: null, closes: null, keyCode: null },
    ...{ contactName: null, contactEmail: null, contactPhone: null, driveUpNotes: "" },
    ...{ hazards: [], tickets: [] },
  };
}

import { type AssetRow, listAssets } from "@/db/queries/assets";
import { listSites, type SiteRow } from "@/db/queries/sites";
import { findClosures } from "@/db/queries/bulk-register";
import type { OutCell } from "@/lib/csv/write-table";
import { type ExportContext, type OutTable, scaled } from "./export-table";

const SITE_HEAD = [
  ...["site code", "site name", "latitude", "longitude", "crew", "climate", "notice days"],
  ...["opens", "closes", "closed seasons", "key", "contact name", "contact email"],
  ...["contact phone", "hazards", "tickets needed", "drive-up notes"],
];

const ASSET_HEAD = [
  ...["tag", "asset name", "device model", "state", "firmware"],
  ...["cost of an hour without data", "asset note"],
];
const SERVICE_HEAD = [
  ...["pack", "pack since", "charge left %", "cut-off 5 %", "cut-off likely", "cut-off 95 %"],
  ...["last voltage V", "last voltage at"],
];

/**
 * Assets as the Fleet lists them, each with all that is known of its site, so that the file makes
 * the same register elsewhere; pack and forecast stand beside, and an import passes them over.
 */
export async function assetTable({ deps, timeZone, assets }: ExportContext): Promise<OutTable> {
  const rows = await listAssets(deps.db, { ...assets, limit: null, offset: 0 });
  const sites = await allSites(deps.db);
  const nowhere = SITE_HEAD.map(() => null);
  return {
    head: [...ASSET_HEAD, ...SITE_HEAD, ...SERVICE_HEAD],
    rows: rows.map((row) => [
      ...[row.tag, row.name, row.modelName, row.state, row.firmware],
      ...[scaled(row.silenceCostMinorPerHour, 2), row.note],
      ...(sites.get(row.siteCode) ?? nowhere),
      ...serviceCells(row, timeZone),
    ]),
  };
}

function serviceCells(row: AssetRow, timeZone: string): OutCell[] {
  const at = (moment: Date | null) => moment && { at: moment, timeZone };
  return [
    ...[row.designation, at(row.installedAt), scaled(row.shareLeftPermille, 1)],
    ...[row.p05, row.p50, row.p95].map(at),
    ...[scaled(row.readMv, 3), at(row.readAt)],
  ];
}

/** The cells of every site, by its code. */
async function allSites(db: ExportContext["deps"]["db"]): Promise<Map<string, OutCell[]>> {
  const every = { search: "", crewId: null, order: "code", descending: false } as const;
  const rows = await listSites(db, { ...every, limit: null, offset: 0 });
  const cells = await siteCells(db, rows);
  return new Map(rows.map((row, n) => [row.code, cells[n] ?? []]));
}

/** Sites as they are listed, with how to get in. */
export async function siteTable({ deps, sites }: ExportContext): Promise<OutTable> {
  const rows = await listSites(deps.db, { ...sites, limit: null, offset: 0 });
  return { head: SITE_HEAD, rows: await siteCells(deps.db, rows) };
}

async function siteCells(
  db: ExportContext["deps"]["db"],
  rows: readonly SiteRow[],
): Promise<OutCell[][]> {
  const seasons = await findClosures(
    db,
    rows.map((row) => row.id),
  );
  return rows.map((row) => [
    ...[row.code, row.name],
    scaled(Math.round(row.latitude * 1e7), 7),
    scaled(Math.round(row.longitude * 1e7), 7),
    ...[row.crewName, row.climateName],
    scaled(row.noticeDays),
    ...[row.opens?.slice(0, 5) ?? null, row.closes?.slice(0, 5) ?? null],
    (seasons.get(row.id) ?? [])
      .map((s) => `${s.firstMonthDay}..${s.lastMonthDay} ${s.reason}`.trim())
      .join(" | "),
    ...[row.keyCode, row.contactName, row.contactEmail, row.contactPhone],
    ...[row.hazards.join(" | "), row.tickets.join(" | "), row.driveUpNotes],
  ]);
}

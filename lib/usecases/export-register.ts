import { listAssets } from "@/db/queries/assets";
import { listSites } from "@/db/queries/sites";
import { findClosures } from "@/db/queries/bulk-register";
import { type ExportContext, type OutTable, scaled } from "./export-table";

const SITE_HEAD = [
  ...["site code", "site name", "latitude", "longitude", "crew", "climate", "notice days"],
  ...["opens", "closes", "closed seasons", "key", "contact name", "contact email"],
  ...["contact phone", "hazards", "tickets needed", "drive-up notes"],
];

/** Assets as the Fleet lists them; forecasts stand beside, and an import passes them over. */
export async function assetTable({ deps, timeZone, assets }: ExportContext): Promise<OutTable> {
  const rows = await listAssets(deps.db, { ...assets, limit: null, offset: 0 });
  return {
    head: [
      ...["tag", "asset name", "device model", "site code", "site name", "latitude", "longitude"],
      ...["crew", "state", "firmware", "pack", "pack since", "charge left %", "cut-off 5 %"],
      ...["cut-off likely", "cut-off 95 %", "last voltage V", "last voltage at"],
    ],
    rows: rows.map((row) => [
      ...[row.tag, row.name, row.modelName, row.siteCode, row.siteName],
      scaled(Math.round(row.latitude * 1e7), 7),
      scaled(Math.round(row.longitude * 1e7), 7),
      ...[row.crewName, row.state, row.firmware, row.designation],
      row.installedAt && { at: row.installedAt, timeZone },
      scaled(row.shareLeftPermille, 1),
      ...[row.p05, row.p50, row.p95].map((at) => at && { at, timeZone }),
      scaled(row.readMv, 3),
      row.readAt && { at: row.readAt, timeZone },
    ]),
  };
}

/** Sites as they are listed, with how to get in. */
export async function siteTable({ deps, sites }: ExportContext): Promise<OutTable> {
  const rows = await listSites(deps.db, { ...sites, limit: null, offset: 0 });
  const seasons = await findClosures(
    deps.db,
    rows.map((row) => row.id),
  );
  return {
    head: SITE_HEAD,
    rows: rows.map((row) => [
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
    ]),
  };
}

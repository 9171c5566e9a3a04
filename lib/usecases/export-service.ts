import { listInstalls, listReadings } from "@/db/queries/exports";
import { type ExportContext, type OutTable, scaled } from "./export-table";

/** Every pack, in service or out. */
export async function installTable({ deps, timeZone }: ExportContext): Promise<OutTable> {
  const at = (moment: Date | null) => moment && { at: moment, timeZone };
  const rows = await listInstalls(deps.db);
  return {
    head: [
      ...["tag", "installed at", "cell type", "series", "parallel", "lot", "made on"],
      ...["removed at", "reason out", "voltage out V", "stopped at", "look of the cells"],
    ],
    rows: rows.map((row) => [
      ...[row.tag, at(row.installedAt), row.designation],
      ...[scaled(row.series), scaled(row.parallel), row.lotCode, row.madeOn, at(row.removedAt)],
      ...[row.reasonOut?.replaceAll("_", " ") ?? null, scaled(row.voltageOutMv, 3)],
      ...[at(row.stoppedAt), row.lookOut],
    ]),
  };
}

/** Every voltage, with the doubt it was kept with. */
export async function readingTable({ deps, timeZone }: ExportContext): Promise<OutTable> {
  const rows = await listReadings(deps.db);
  return {
    head: [
      ...["tag", "read at", "voltage V", "kind", "load current mA", "temperature C"],
      ...["accuracy mV", "instrument", "note", "doubt"],
    ],
    rows: rows.map((row) => [
      ...[row.tag, { at: row.at, timeZone }, scaled(row.millivolts, 3), row.kind],
      ...[scaled(row.loadUa, 3), scaled(row.temperatureDc, 1), scaled(row.accuracyMv)],
      ...[row.instrument, row.note, row.doubt],
    ]),
  };
}

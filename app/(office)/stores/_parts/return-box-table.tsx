import { type Column, DataTable } from "@/components/ui/data-table";
import { formatDay } from "@/lib/present/format-day";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { formatNumber, NOTHING } from "@/lib/present/locale";
import { CHEMISTRY_WORDS } from "../../fleet/_parts/fleet-words";
import type { ReturnBoxView } from "@/lib/usecases/return-box";
import { CollectDialog } from "./collect-dialog";

type Row = ReturnBoxView["rows"][number];

/** What waits for recycling, by cell type and lot; a type is collected as a whole. */
export function ReturnBoxTable({ view, mayCollect }: { view: ReturnBoxView; mayCollect: boolean }) {
  return (
    <DataTable
      caption="Cells for recycling"
      columns={columns(view, mayCollect)}
      rows={view.rows}
      rowKey={(row) => `${row.cellTypeId} ${row.lotId}`}
      empty="The return box is empty. Cells stand here when a swap says that they came out."
    />
  );
}

function columns({ organisation, rows, now }: ReturnBoxView, mayCollect: boolean): Column<Row>[] {
  const { locale, timeZone } = organisation;
  const count = (cells: string | number | null) => formatNumber(Number(cells ?? 0), locale);
  const first = (row: Row) => rows.find((other) => other.cellTypeId === row.cellTypeId) === row;
  const all = (row: Row) => rows.filter((other) => other.cellTypeId === row.cellTypeId);
  const list: Column<Row>[] = [
    { key: "type", head: "Cells", rowHeader: true, cell: (row) => row.designation },
    {
      key: "chemistry",
      head: "Chemistry",
      cell: (row) => CHEMISTRY_WORDS[row.chemistry] ?? row.chemistry,
    },
    {
      key: "lot",
      head: "Lot",
      cell: (row) => <span className="font-mono text-xs">{row.lotCode ?? NOTHING}</span>,
    },
    { key: "cells", head: "Cells in it", align: "right", cell: (row) => count(row.cells) },
    { key: "damaged", head: "Damaged", align: "right", cell: (row) => count(row.damaged) },
    { key: "packs", head: "From packs", align: "right", cell: (row) => count(row.packs) },
    {
      key: "since",
      head: "Since",
      cell: (row) => (row.since ? formatDay(dayOfInstant(row.since, timeZone), locale) : NOTHING),
    },
  ];
  if (!mayCollect) return list;
  return [
    ...list,
    {
      key: "act",
      head: "Recycling",
      cell: (row) =>
        first(row) && (
          <CollectDialog
            cellTypeId={row.cellTypeId}
            designation={row.designation}
            cells={all(row).reduce((sum, other) => sum + Number(other.cells), 0)}
            until={now.toISOString()}
          />
        ),
    },
  ];
}

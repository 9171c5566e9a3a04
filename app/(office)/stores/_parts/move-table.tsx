import { type Column, DataTable } from "@/components/ui/data-table";
import { Pager } from "@/components/ui/pager";
import { formatInstant } from "@/lib/present/format-time";
import { formatNumber, NOTHING } from "@/lib/present/locale";
import { hrefWith, pageSummary } from "@/lib/present/paging";
import type { MovesView } from "@/lib/usecases/read-stores";

type Row = MovesView["rows"][number];

/** One page of the book of moves. */
export function MoveTable({ view }: { view: MovesView }) {
  const { page, pageSize, total, organisation } = view;
  return (
    <>
      <DataTable
        caption="Moves of cells"
        columns={columns(organisation)}
        rows={view.rows}
        rowKey={(row) => row.id}
        empty="No cell has been moved yet."
      />
      <Pager
        page={page}
        pageCount={Math.max(1, Math.ceil(total / pageSize))}
        summary={pageSummary(page, pageSize, total, "moves", organisation.locale)}
        hrefFor={(next) => hrefWith("/stores/moves", {}, { page: next })}
      />
    </>
  );
}

function columns(organisation: MovesView["organisation"]): Column<Row>[] {
  return [
    {
      key: "at",
      head: "When",
      rowHeader: true,
      cell: (row) => formatInstant(row.at, organisation),
    },
    {
      key: "lot",
      head: "Lot",
      cell: (row) => <span className="font-mono text-xs font-semibold">{row.lotCode}</span>,
    },
    { key: "type", head: "Cells", cell: (row) => row.designation },
    {
      key: "cells",
      head: "How many",
      align: "right",
      cell: (row) => formatNumber(row.cells, organisation.locale),
    },
    { key: "reason", head: "Why", cell: (row) => row.reason },
    { key: "from", head: "From", cell: (row) => row.fromPlace ?? NOTHING },
    { key: "to", head: "To", cell: (row) => row.toPlace ?? NOTHING },
    { key: "by", head: "By", cell: (row) => row.personName ?? NOTHING },
    {
      key: "note",
      head: "Note",
      wideOnly: true,
      cell: (row) => <span className="block max-w-64 truncate text-soft">{row.note}</span>,
    },
  ];
}

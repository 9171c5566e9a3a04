import { type Column, DataTable } from "@/components/ui/data-table";
import type { AssetView } from "@/lib/usecases/read-asset";
import { type HistoryRow, historyRows } from "./asset-history";

/** What happened to the asset, newest first. */
export function AssetHistory({ view }: { view: AssetView }) {
  return (
    <DataTable
      caption="History"
      showCaption
      columns={COLUMNS}
      rows={historyRows(view)}
      rowKey={(row) => row.key}
      empty="Nothing has happened to this asset yet."
    />
  );
}

const COLUMNS: readonly Column<HistoryRow>[] = [
  { key: "when", head: "When", rowHeader: true, cell: (row) => row.when },
  { key: "what", head: "What", cell: (row) => row.what },
  {
    key: "detail",
    head: "How",
    cell: (row) => <span className="block min-w-40 py-1 whitespace-normal">{row.detail}</span>,
  },
  { key: "by", head: "By", cell: (row) => <span className="text-soft">{row.by}</span> },
];

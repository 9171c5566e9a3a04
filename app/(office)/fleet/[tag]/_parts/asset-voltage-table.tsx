import { type Column, DataTable } from "@/components/ui/data-table";
import { EmptyState } from "@/components/ui/states";
import type { AssetView } from "@/lib/usecases/read-asset";
import { voltageRows, type VoltageRow } from "./asset-voltages";
import { VerdictDialog } from "./verdict-dialog";

/** Every voltage of the pack, how much it counted, and the verdicts given on it. */
export function AssetVoltages(props: {
  view: AssetView;
  /** Days by which each reading alone moved the likely date, by its id. */
  moved: Readonly<Record<string, number>>;
  mayJudge: boolean;
}) {
  const { view, moved, mayJudge } = props;
  if (!view.pack) return null;
  const judge: Column<VoltageRow> = {
    key: "judge",
    head: <span className="sr-only">Verdict</span>,
    align: "right",
    cell: (row) => <VerdictDialog readingId={row.id} called={`${row.volts}, ${row.when}`} />,
  };
  return (
    <div className="mb-5">
      <DataTable
        caption="Voltages of this pack"
        showCaption
        columns={mayJudge ? [...COLUMNS, judge] : COLUMNS}
        rows={voltageRows(view, moved)}
        rowKey={(row) => row.id}
        empty={
          <EmptyState title="No voltage logged yet.">
            One resting voltage a visit is enough to narrow the dates.
          </EmptyState>
        }
      />
    </div>
  );
}

const COLUMNS: readonly Column<VoltageRow>[] = [
  { key: "when", head: "Read", rowHeader: true, cell: (row) => row.when },
  {
    key: "volts",
    head: "Voltage",
    align: "right",
    cell: (row) => <span className="font-mono text-xs font-semibold">{row.volts}</span>,
  },
  { key: "condition", head: "How", cell: (row) => row.condition },
  { key: "expected", head: "Expected", align: "right", cell: (row) => row.expected },
  {
    key: "counts",
    head: "Counts",
    cell: (row) => <span className="text-soft">{row.counts}</span>,
  },
  { key: "moved", head: "Moved the likely date", align: "right", cell: (row) => row.moved },
  {
    key: "remark",
    head: "Remark",
    cell: (row) => (
      <span className="block max-w-80 min-w-24 py-1 whitespace-normal">{row.remark}</span>
    ),
  },
  {
    key: "by",
    head: "By",
    wideOnly: true,
    cell: (row) => <span className="text-soft">{row.by}</span>,
  },
];

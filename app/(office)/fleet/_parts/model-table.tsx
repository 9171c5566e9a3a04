import Link from "next/link";
import { LinkButton } from "@/components/ui/button";
import { type Column, DataTable } from "@/components/ui/data-table";
import { EmptyState } from "@/components/ui/states";
import { averageUa, peakUa } from "@/lib/present/duty-cycle";
import { formatCurrent, formatMoney, formatVolts } from "@/lib/present/format-quantity";
import { formatNumber } from "@/lib/present/locale";
import { hrefWith } from "@/lib/present/paging";
import type { DeviceModelListView } from "@/lib/usecases/list-device-models";

/** All device models. */
export function ModelTable({ view }: { view: DeviceModelListView }) {
  return (
    <DataTable
      caption="Device models"
      columns={columns(view.organisation)}
      rows={view.rows}
      rowKey={(row) => row.id}
      empty={
        <EmptyState
          title="No device model yet."
          action={<LinkButton href="/import">Import a CSV file</LinkButton>}
        >
          A model says what its devices draw; assets need one.
        </EmptyState>
      }
    />
  );
}

type Row = DeviceModelListView["rows"][number];

function columns(organisation: DeviceModelListView["organisation"]): Column<Row>[] {
  const { locale } = organisation;
  return [
    {
      key: "name",
      head: "Model",
      rowHeader: true,
      cell: (row) => (
        <Link href={`/fleet/models/${row.id}`} className="font-medium hover:underline">
          {row.name}
        </Link>
      ),
    },
    {
      key: "pack",
      head: "Pack",
      cell: (row) => (
        <span className="font-cond text-soft">
          {row.series}s{row.parallel > 1 ? `${row.parallel}p` : ""} ·{" "}
          {row.cells.map((cell) => cell.designation).join(", ")}
        </span>
      ),
    },
    {
      key: "cutoff",
      head: "Cut-off",
      align: "right",
      cell: (row) => formatVolts(row.cutoffMv, locale),
    },
    {
      key: "average",
      head: "Average draw",
      align: "right",
      cell: (row) => formatCurrent(averageUa(row.states), locale),
    },
    {
      key: "peak",
      head: "Peak draw",
      align: "right",
      cell: (row) => formatCurrent(peakUa(row.states), locale),
    },
    {
      key: "swap",
      head: "Swap",
      align: "right",
      wideOnly: true,
      cell: (row) => `${row.swapMinutes} min`,
    },
    {
      key: "silence",
      head: "Hour without data",
      align: "right",
      wideOnly: true,
      cell: (row) => formatMoney(row.silenceCostMinorPerHour, organisation),
    },
    {
      key: "assets",
      head: "Assets",
      align: "right",
      cell: (row) => (
        <Link
          href={hrefWith("/fleet", {}, { model: row.id })}
          className="text-dusk-ink hover:underline"
        >
          {formatNumber(row.assets, locale)}
        </Link>
      ),
    },
  ];
}

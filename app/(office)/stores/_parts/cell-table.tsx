import Link from "next/link";
import { LinkButton } from "@/components/ui/button";
import { type Column, DataTable } from "@/components/ui/data-table";
import { Notice } from "@/components/ui/notice";
import { EmptyState } from "@/components/ui/states";
import { formatAh, formatMoney, formatVolts } from "@/lib/present/format-quantity";
import { formatNumber } from "@/lib/present/locale";
import { hrefWith } from "@/lib/present/paging";
import type { StoresView } from "@/lib/usecases/read-stores";

type Row = StoresView["rows"][number];

/** Cell types with their counts by place; what is low is said in words. */
export function CellTable({ view }: { view: StoresView }) {
  const low = view.rows.filter((row) => row.low);
  return (
    <>
      {low.length > 0 && (
        <Notice kind="warn">
          Below the reorder point: {low.map((row) => row.designation).join(", ")}.
        </Notice>
      )}
      <DataTable
        caption="Cells by type and place"
        columns={columns(view)}
        rows={view.rows}
        rowKey={(row) => row.id}
        empty={
          <EmptyState
            title="No cell type yet."
            action={<LinkButton href="/import">Import a CSV file</LinkButton>}
          >
            Cell types come first: packs, lots and forecasts rest on them.
          </EmptyState>
        }
      />
    </>
  );
}

function columns({ places, organisation }: StoresView): Column<Row>[] {
  const { locale } = organisation;
  const count = (cells: number) =>
    cells === 0 ? <span className="text-soft">–</span> : formatNumber(cells, locale);
  return [
    {
      key: "designation",
      head: "Cells",
      rowHeader: true,
      cell: (row) => (
        <>
          <Link href={`/stores/cells/${row.id}`} className="font-semibold hover:underline">
            {row.designation}
          </Link>{" "}
          <span className="text-soft max-sm:hidden">{row.name}</span>
        </>
      ),
    },
    {
      key: "rated",
      head: "Rated",
      wideOnly: true,
      cell: (row) => (
        <span className="font-cond text-soft">
          {formatVolts(row.nominalMv, locale, 1)} · {formatAh(row.ratedCapacityMah, locale)}
        </span>
      ),
    },
    ...places.map((place, n): Column<Row> => ({
      key: place.id,
      head: place.name,
      align: "right",
      cell: (row) => count(row.byPlace[n] ?? 0),
    })),
    {
      key: "all",
      head: "To hand",
      align: "right",
      cell: (row) => <b className="font-medium">{formatNumber(row.inStock, locale)}</b>,
    },
    {
      key: "reorder",
      head: "Order below",
      align: "right",
      cell: (row) =>
        row.low ? (
          <span className="text-brick-ink">low: {formatNumber(row.reorderPoint, locale)}</span>
        ) : (
          count(row.reorderPoint)
        ),
    },
    {
      key: "cost",
      head: "A cell costs",
      align: "right",
      wideOnly: true,
      cell: (row) => formatMoney(row.unitCostMinor, organisation),
    },
    {
      key: "lots",
      head: <span className="sr-only">Lots</span>,
      align: "right",
      cell: (row) => (
        <Link href={hrefWith("/stores/lots", {}, { type: row.id })} className="textlink">
          lots<span className="sr-only"> of {row.designation}</span>
        </Link>
      ),
    },
  ];
}

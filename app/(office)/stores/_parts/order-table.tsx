import Link from "next/link";
import { LinkButton } from "@/components/ui/button";
import { type Column, DataTable } from "@/components/ui/data-table";
import { Notice } from "@/components/ui/notice";
import { EmptyState } from "@/components/ui/states";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { formatDay } from "@/lib/present/format-day";
import { formatMoney } from "@/lib/present/format-quantity";
import { formatNumber, NOTHING } from "@/lib/present/locale";
import type { DemandView } from "@/lib/usecases/read-demand";

type Row = DemandView["rows"][number];

/** What to order, by cell type: how long the stock lasts and when the next order is due. */
export function OrderTable({ view }: { view: DemandView }) {
  const due = view.rows.filter((row) => row.order.orderNow > 0);
  return (
    <section className="mb-6">
      {due.length > 0 && (
        <Notice kind="warn">
          To order now: {due.map((row) => orderWords(row, view)).join(", ")}. An order that is
          already on its way is not known here.
        </Notice>
      )}
      <DataTable
        caption="What to order"
        showCaption
        columns={columns(view)}
        rows={view.rows}
        rowKey={(row) => row.type.id}
        empty={
          <EmptyState
            title="Nothing asks for cells yet."
            action={<LinkButton href="/import">Import a CSV file</LinkButton>}
          >
            Demand follows from the forecasts of the packs that are in.
          </EmptyState>
        }
      />
    </section>
  );
}

function orderWords({ order, type }: Row, { organisation }: DemandView): string {
  return `${formatNumber(order.orderNow, organisation.locale)} × ${type.designation}`;
}

function columns({ organisation, now }: DemandView): Column<Row>[] {
  const { locale } = organisation;
  const today = dayOfInstant(now, organisation.timeZone);
  const count = (cells: number) => formatNumber(cells, locale);
  const day = (on: string | null) => (on === null ? NOTHING : formatDay(on, locale, { today }));
  return [
    {
      key: "designation",
      head: "Cells",
      rowHeader: true,
      cell: ({ type }) => (
        <>
          <Link href={`/stores/cells/${type.id}`} className="font-semibold hover:underline">
            {type.designation}
          </Link>{" "}
          <span className="text-soft max-xl:hidden">{type.name}</span>
        </>
      ),
    },
    {
      key: "packs",
      head: "Packs in",
      align: "right",
      wideOnly: true,
      cell: (row) => count(row.packs),
    },
    {
      key: "lead",
      head: "Delivery",
      align: "right",
      wideOnly: true,
      cell: ({ type }) => `${count(type.leadTimeDays)} d`,
    },
    { key: "stock", head: "To hand", align: "right", cell: (row) => count(row.type.inStock) },
    {
      key: "by",
      head: "Order by",
      align: "right",
      cell: ({ order }) =>
        order.orderNow > 0 ? <b className="text-brick-ink">now</b> : day(order.orderBy),
    },
    {
      key: "size",
      head: "Order",
      align: "right",
      cell: ({ order }) => (order.orderSize > 0 ? count(order.orderSize) : NOTHING),
    },
    {
      key: "short",
      head: "May run short",
      align: "right",
      cell: ({ order }) => (order.shortFrom === null ? "not this year" : day(order.shortFrom)),
    },
    {
      key: "cost",
      head: "Costs",
      align: "right",
      cell: ({ order, type }) =>
        order.orderSize > 0
          ? formatMoney(order.orderSize * type.unitCostMinor, organisation, { whole: true })
          : NOTHING,
    },
    {
      key: "point",
      head: "Order below: set",
      align: "right",
      wideOnly: true,
      cell: ({ type }) => count(type.reorderPoint),
    },
    {
      key: "proposed",
      head: "from forecasts",
      align: "right",
      wideOnly: true,
      cell: ({ order }) => count(order.reorderPoint),
    },
  ];
}

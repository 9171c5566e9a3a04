import { type Column, DataTable } from "@/components/ui/data-table";
import { formatMonth } from "@/lib/present/format-day";
import { EN_DASH, formatNumber } from "@/lib/present/locale";
import type { CellDemand } from "@/lib/planning/demand";
import type { DemandView } from "@/lib/usecases/read-demand";

type Row = DemandView["rows"][number];

/** Cells asked for by month: the expected number, and the range that holds four times in five. */
export function DemandTable({ view }: { view: DemandView }) {
  if (view.rows.length === 0) return null;
  return (
    <section>
      <DataTable
        caption="Cells asked for by month"
        showCaption
        columns={columns(view)}
        rows={view.rows}
        rowKey={(row) => row.type.id}
      />
      <p className="mt-2 max-w-prose text-soft">
        Expected number, and the range that should hold four times in five. Packs that are out
        already count in the first month. Counted when the pack stops its device; a swap on the way
        comes sooner. The order covers what may be asked for, at 95 %, until a week after its
        delivery and a quarter beyond, or half the shelf life where that is shorter.
      </p>
    </section>
  );
}

function columns({ months, organisation }: DemandView): Column<Row>[] {
  const { locale } = organisation;
  const figure = (key: string, head: string, of: (row: Row) => CellDemand): Column<Row> => ({
    key,
    head,
    align: "right",
    cell: (row) => <Figure demand={of(row)} locale={locale} />,
  });
  return [
    {
      key: "designation",
      head: "Cells",
      rowHeader: true,
      cell: ({ type }) => <span className="font-semibold">{type.designation}</span>,
    },
    ...months.map((month, i) =>
      figure(month, formatMonth(month, locale), (row) => row.byMonth[i]!),
    ),
    figure("total", `In ${months.length} months`, (row) => row.total),
  ];
}

function Figure({ demand, locale }: { demand: CellDemand; locale: string }) {
  const count = (cells: number) => formatNumber(cells, locale);
  if (demand.p90 === 0 && demand.mean < 0.5) return <span className="text-soft">{EN_DASH}</span>;
  return (
    <>
      <b className="font-medium">{count(demand.mean)}</b>{" "}
      <span className="font-cond text-soft">
        {count(demand.p10)}
        {EN_DASH}
        {count(demand.p90)}
      </span>
    </>
  );
}

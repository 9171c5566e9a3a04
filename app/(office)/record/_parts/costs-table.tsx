import { type Column, DataTable } from "@/components/ui/data-table";
import { EmptyState } from "@/components/ui/states";
import { formatMonth } from "@/lib/present/format-day";
import { formatMoney } from "@/lib/present/format-quantity";
import { formatPercent } from "@/lib/present/format-share";
import { formatNumber, NOTHING } from "@/lib/present/locale";
import type { CostsView } from "@/lib/usecases/read-costs";

type Month = CostsView["months"][number];

export function CostsTable({ view }: { view: CostsView }) {
  return (
    <DataTable
      caption="Swaps and their cost by month, newest first"
      columns={columns(view)}
      rows={[...view.months].reverse()}
      rowKey={(row) => row.month}
      empty={
        <EmptyState title="No pack has come out yet.">
          Costs appear with the first swap that is logged.
        </EmptyState>
      }
    />
  );
}

function columns({ organisation }: CostsView): Column<Month>[] {
  const { locale } = organisation;
  const number = (value: number) => formatNumber(value, locale);
  const money = (minor: number) => formatMoney(Math.round(minor), organisation, { whole: true });
  const column = (key: string, head: string, cell: (row: Month) => string): Column<Month> => ({
    key,
    head,
    align: "right",
    cell,
  });
  return [
    {
      key: "month",
      head: "Month",
      rowHeader: true,
      cell: (row) => formatMonth(`${row.month}-01`, locale),
    },
    column("removals", "Came out", (row) => number(row.removals)),
    column("early", "Early", (row) => number(row.early)),
    column("due", "When due", (row) => number(row.due)),
    column("stopped", "Had stopped", (row) => number(row.stopped)),
    column("silent", "Silent hours", (row) => number(row.silentHours)),
    column("thrown", "Charge thrown away", (row) =>
      row.thrownShare === null ? NOTHING : formatPercent(row.thrownShare, locale),
    ),
    column("rounds", "Rounds", (row) => number(row.rounds)),
    column("km", "Driven", (row) => `${number(row.kilometres)} km`),
    column("cells", "Cells", (row) => money(row.cellsMinor)),
    column("crew", "Crew", (row) => money(row.crewMinor)),
    column("travel", "Driving", (row) => money(row.travelMinor)),
    column("total", "Together", (row) => money(row.cellsMinor + row.crewMinor + row.travelMinor)),
  ];
}

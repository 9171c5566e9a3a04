import Link from "next/link";
import { type Column, DataTable } from "@/components/ui/data-table";
import { NOTHING } from "@/lib/present/locale";
import type { PlanComparison } from "@/lib/usecases/compare-plans";

type Figure = PlanComparison["figures"][number];
type Change = PlanComparison["changes"][number];
type Head = PlanComparison["plans"][number];

/** What two plans cost and do, and every visit that stands elsewhere in the second. */
export function ComparedTables({ view }: { view: PlanComparison }) {
  return (
    <div className="grid items-start gap-6 xl:grid-cols-2">
      <DataTable
        caption="Cost, hours and risk"
        showCaption
        columns={figureColumns(view.plans)}
        rows={view.figures}
        rowKey={(row) => row.label}
        empty="One of the two is still being built."
      />
      <DataTable
        caption="Visits that change"
        showCaption
        columns={changeColumns(view.plans)}
        rows={view.changes}
        rowKey={(row) => `${row.siteId} ${row.before} ${row.after}`}
        empty="Every visit keeps its day and its technician."
      />
    </div>
  );
}

function PlanName({ plan, place }: { plan: Head; place: string }) {
  return (
    <Link href={`/rounds?week=${plan.firstDay}&plan=${plan.id}`} className="hover:underline">
      {place}: {plan.state}
    </Link>
  );
}

function figureColumns([a, b]: PlanComparison["plans"]): Column<Figure>[] {
  return [
    { key: "label", head: "Figure", rowHeader: true, cell: (row) => row.label },
    {
      key: "a",
      head: <PlanName plan={a} place="First" />,
      align: "right",
      cell: (row) => row.values[0],
    },
    {
      key: "b",
      head: <PlanName plan={b} place="Second" />,
      align: "right",
      cell: (row) => row.values[1],
    },
    {
      key: "change",
      head: "Second less first",
      align: "right",
      cell: (row) => <Change row={row} />,
    },
  ];
}

/** A change is told by its sign and in words, not by colour alone. */
function Change({ row }: { row: Figure }) {
  if (row.better === 0) return <span className="text-soft">{row.change}</span>;
  const tone = row.better > 0 ? "text-spruce-ink" : "text-brick-ink";
  return (
    <span className={tone}>
      {row.change} {row.better > 0 ? "better" : "worse"}
    </span>
  );
}

function changeColumns(plans: PlanComparison["plans"]): Column<Change>[] {
  const [a, b] = plans;
  return [
    { key: "site", head: "Site", rowHeader: true, cell: (row) => row.site },
    {
      key: "before",
      head: <PlanName plan={a} place="First" />,
      cell: (row) => row.before ?? NOTHING,
    },
    {
      key: "after",
      head: <PlanName plan={b} place="Second" />,
      cell: (row) => row.after ?? "left out",
    },
  ];
}

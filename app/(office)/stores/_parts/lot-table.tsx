import Link from "next/link";
import { PickFilter } from "@/components/forms/pick-filter";
import { ChipLink, FilterBar } from "@/components/ui/chip-link";
import { type Column, DataTable } from "@/components/ui/data-table";
import { Pager } from "@/components/ui/pager";
import { EmptyState } from "@/components/ui/states";
import { formatDay } from "@/lib/present/format-day";
import { formatNumber, NOTHING } from "@/lib/present/locale";
import { hrefWith, pageSummary } from "@/lib/present/paging";
import type { LotsView } from "@/lib/usecases/read-stores";
import { CountDialog, MoveDialog } from "./lot-dialogs";

type Row = LotsView["lots"][number];

export interface LotTableProps {
  view: LotsView;
  params: Record<string, string | undefined>;
  mayChange: boolean;
}

/** Lots with stock, or all there ever were. */
export function LotTable({ view, params, mayChange }: LotTableProps) {
  const all = params.all === "yes";
  const { page, pageSize, total } = view;
  const summary = pageSummary(page, pageSize, total, "lots", view.organisation.locale);
  return (
    <>
      <FilterBar summary={summary}>
        <PickFilter
          {...{ path: "/stores/lots", params, name: "type", label: "Cell type" }}
          all="All cells"
          choices={view.cellTypes.map((c) => ({ value: c.id, label: c.designation }))}
        />
        <ChipLink href={hrefWith("/stores/lots", params, { all: all ? null : "yes" })} active={all}>
          used-up lots too
        </ChipLink>
      </FilterBar>
      <DataTable
        caption="Lots"
        columns={columns(view, mayChange)}
        rows={view.lots}
        rowKey={(row) => row.id}
        empty={
          <EmptyState title="No lot here.">
            Receive a delivery, and its cells can be moved to the vans.
          </EmptyState>
        }
      />
      <Pager
        page={page}
        pageCount={Math.max(1, Math.ceil(total / pageSize))}
        summary={summary}
        hrefFor={(next) => hrefWith("/stores/lots", params, { page: next })}
      />
    </>
  );
}

function columns(view: LotsView, mayChange: boolean): Column<Row>[] {
  const { locale } = view.organisation;
  const day = (value: string | null) => (value ? formatDay(value, locale) : NOTHING);
  const acts: Column<Row> = {
    key: "acts",
    head: <span className="sr-only">Acts</span>,
    align: "right",
    cell: (row) => (
      <>
        <MoveDialog lot={row} places={view.places} />
        <CountDialog lot={row} places={view.places} />
      </>
    ),
  };
  return [
    {
      key: "code",
      head: "Lot",
      rowHeader: true,
      cell: (row) => (
        <>
          <span className="font-mono text-xs font-semibold">{row.code}</span>{" "}
          {view.weakLots.has(row.id) && (
            <Link href="/record/findings" className="textlink">
              weak lot
            </Link>
          )}
        </>
      ),
    },
    { key: "type", head: "Cells", cell: (row) => row.designation },
    { key: "made", head: "Made", cell: (row) => day(row.madeOn) },
    { key: "received", head: "Received", wideOnly: true, cell: (row) => day(row.receivedOn) },
    {
      key: "left",
      head: "Left",
      align: "right",
      cell: (row) => (
        <>
          {formatNumber(row.left, locale)}{" "}
          <span className="text-soft">of {formatNumber(row.cellsReceived, locale)}</span>
        </>
      ),
    },
    {
      key: "places",
      head: "Where",
      cell: (row) => (
        <span className="block max-w-96 truncate text-soft">
          {row.places.map((p) => `${p.name} ${formatNumber(p.cells, locale)}`).join(" · ") ||
            NOTHING}
        </span>
      ),
    },
    {
      key: "packs",
      head: "Packs in service",
      align: "right",
      wideOnly: true,
      cell: (row) => formatNumber(row.packsIn, locale),
    },
    ...(mayChange ? [acts] : []),
  ];
}

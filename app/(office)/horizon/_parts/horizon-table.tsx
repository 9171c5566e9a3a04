import Link from "next/link";
import { SpanStrip } from "@/components/charts/span-strip";
import { StripHead } from "@/components/charts/strip-head";
import { WaneDisc } from "@/components/charts/wane-disc";
import { type Column, DataTable } from "@/components/ui/data-table";
import { Pager } from "@/components/ui/pager";
import { horizonAxis, horizonHead, horizonRow, type HorizonRowModel } from "@/lib/present/horizon";
import { hrefWith, pageSummary } from "@/lib/present/paging";
import type { StripHeadModel } from "@/lib/present/strip-head";
import type { HorizonView } from "@/lib/usecases/read-horizon";
import { FindingMark } from "./finding-mark";
import type { HorizonParams } from "./horizon-params";
import { NothingDue } from "./nothing-due";

const STRIP_PX = 430;

/** Every pack by when it will reach cut-off, on one time axis. */
export function HorizonTable({ view, params }: { view: HorizonView; params: HorizonParams }) {
  const { organisation, today, input, rows } = view;
  const axis = horizonAxis(today, organisation.locale, STRIP_PX);
  const head = horizonHead(axis, today, organisation.locale, view.weeks);
  const models = rows.map((row) => horizonRow(row, axis, today, organisation));
  const total = rows[0]?.total ?? 0;
  return (
    <>
      <DataTable
        caption="Packs in service by when they reach cut-off"
        columns={columns(head, view.findings)}
        rows={models}
        rowKey={(row) => row.key}
        sort={{
          key: input.order,
          direction: input.descending ? "descending" : "ascending",
          hrefFor: (order, direction) =>
            hrefWith("/horizon", params, {
              order,
              dir: direction === "ascending" ? "asc" : "desc",
            }),
        }}
        empty={<NothingDue narrowed={Object.keys(params).length > 0} />}
      />
      <Pager
        page={input.page}
        pageCount={Math.max(1, Math.ceil(total / input.pageSize))}
        summary={pageSummary(input.page, input.pageSize, total, "packs", organisation.locale)}
        hrefFor={(page) => hrefWith("/horizon", params, { page })}
      />
    </>
  );
}

function columns(
  head: StripHeadModel,
  findings: HorizonView["findings"],
): Column<HorizonRowModel>[] {
  return [
    {
      key: "tag",
      head: "Asset",
      sortKey: "tag",
      rowHeader: true,
      cell: (row) => (
        <Link
          href={`/fleet/${encodeURIComponent(row.tag)}`}
          className="font-mono text-xs font-semibold hover:underline"
        >
          {row.tag}
        </Link>
      ),
    },
    {
      key: "site",
      head: "Name and site",
      sortKey: "site",
      cell: (row) => (
        <span
          className="block max-w-60 truncate"
          title={[row.asset, row.site].filter(Boolean).join(", ")}
        >
          <FindingMark kinds={findings.get(row.key)} />
          {row.asset} <span className="text-soft">{row.site}</span>
        </span>
      ),
    },
    {
      key: "pack",
      head: "Pack",
      wideOnly: true,
      cell: (row) => <span className="font-cond text-soft">{row.pack}</span>,
    },
    {
      key: "left",
      head: "Left",
      sortKey: "left",
      cell: (row) => (
        <span className="inline-flex items-center gap-2">
          <WaneDisc model={row.disc} decorative /> {row.left}
        </span>
      ),
    },
    {
      key: "strip",
      head: <StripHead model={head} />,
      fit: "flush",
      cell: (row) => <SpanStrip model={row.strip} />,
    },
    {
      key: "window",
      head: "Cut-off window",
      sortKey: "cutoff",
      cell: (row) => <CutoffWindow row={row} />,
    },
    {
      key: "waiting",
      head: "Waiting costs",
      sortKey: "waiting",
      align: "right",
      cell: (row) => row.waiting,
    },
    {
      key: "visit",
      head: "Visit",
      cell: ({ visit }) =>
        visit.href ? (
          <Link href={visit.href} className="text-dusk-ink hover:underline">
            {visit.label}
          </Link>
        ) : (
          <span className="text-soft">{visit.label}</span>
        ),
    },
  ];
}

function CutoffWindow({ row }: { row: HorizonRowModel }) {
  if (!row.window) return <span className="text-soft">being worked out</span>;
  return (
    <>
      {row.window.from} – <b>{row.window.likely}</b> – {row.window.to}
      {row.stale && <span className="ml-1.5 text-soft">· being renewed</span>}
    </>
  );
}

"use client";

import Link from "next/link";
import { SpanStrip, StripGround } from "@/components/charts/span-strip";
import { StripHead } from "@/components/charts/strip-head";
import { WaneDisc } from "@/components/charts/wane-disc";
import { type Column, DataTable } from "@/components/ui/data-table";
import { TagLink } from "@/components/ui/tag-link";
import type { HorizonRowModel } from "@/lib/present/horizon";
import { hrefWith } from "@/lib/present/paging";
import type { StripScale } from "@/lib/present/span-strip";
import type { StripHeadModel } from "@/lib/present/strip-head";
import type { HorizonView } from "@/lib/usecases/read-horizon";
import { FindingMark } from "./finding-mark";
import type { HorizonParams } from "./horizon-params";
import { NothingDue } from "./nothing-due";

/** All strips of the table are drawn on one ground. */
const GROUND = "horizon-ground";

export interface HorizonRowsProps {
  scale: StripScale;
  head: StripHeadModel;
  rows: readonly HorizonRowModel[];
  findings: HorizonView["findings"];
  order: string;
  descending: boolean;
  params: HorizonParams;
}

/**
 * The rows of the Horizon. A client component, so that the page carries each row once as data:
 * as a server component a row would go out twice, as markup and as the tree that it came from.
 */
export function HorizonRows(props: HorizonRowsProps) {
  const { rows, order, descending, params } = props;
  return (
    <DataTable
      caption="Packs in service by when they reach cut-off"
      columns={columns(props)}
      rows={rows}
      rowKey={(row) => row.key}
      sort={{
        key: order,
        direction: descending ? "descending" : "ascending",
        hrefFor: (key, direction) =>
          hrefWith("/horizon", params, {
            order: key,
            dir: direction === "ascending" ? "asc" : "desc",
          }),
      }}
      empty={<NothingDue narrowed={Object.keys(params).length > 0} />}
    />
  );
}

function columns({ scale, head, findings }: HorizonRowsProps): Column<HorizonRowModel>[] {
  return [
    {
      key: "tag",
      head: "Asset",
      sortKey: "tag",
      rowHeader: true,
      cell: (row) => <TagLink tag={row.tag} />,
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
          {row.asset}
          {row.site && <span className="text-soft"> {row.site}</span>}
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
        <span className="flex items-center gap-2">
          <WaneDisc model={row.disc} decorative />
          {row.disc.label}
        </span>
      ),
    },
    {
      key: "strip",
      head: (
        <>
          <StripGround id={GROUND} scale={scale} />
          <StripHead model={head} />
        </>
      ),
      fit: "flush",
      cell: (row) => <SpanStrip scale={scale} model={row.strip} groundId={GROUND} />,
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
          <Link href={visit.href} prefetch={false} className="text-dusk-ink hover:underline">
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
      {`${row.window.from} – `}
      <b>{row.window.likely}</b>
      {` – ${row.window.to}`}
      {row.stale && <span className="ml-1.5 text-soft">· being renewed</span>}
    </>
  );
}

import Link from "next/link";
import { WaneDisc } from "@/components/charts/wane-disc";
import { LinkButton } from "@/components/ui/button";
import { type Column, DataTable } from "@/components/ui/data-table";
import { Pager } from "@/components/ui/pager";
import { EmptyState } from "@/components/ui/states";
import { TagLink } from "@/components/ui/tag-link";
import { NOTHING } from "@/lib/present/locale";
import { hrefWith, pageSummary } from "@/lib/present/paging";
import type { AssetListView } from "@/lib/usecases/list-assets";
import type { ListParams } from "./fleet-params";
import { type FleetRow, fleetRows } from "./fleet-rows";

/** One page of the fleet. */
export function FleetTable({ view, params }: { view: AssetListView; params: ListParams }) {
  const { page, pageSize, total, organisation } = view;
  return (
    <>
      <DataTable
        caption="Assets of the fleet"
        columns={COLUMNS}
        rows={fleetRows(view)}
        rowKey={(row) => row.tag}
        sort={{
          key: params.order ?? "tag",
          direction: params.dir === "desc" ? "descending" : "ascending",
          hrefFor: (order, direction) =>
            hrefWith("/fleet", params, { order, dir: direction === "descending" ? "desc" : null }),
        }}
        empty={<NoAssets narrowed={Object.values(params).some(Boolean)} />}
      />
      <Pager
        page={page}
        pageCount={Math.max(1, Math.ceil(total / pageSize))}
        summary={pageSummary(page, pageSize, total, "assets", organisation.locale)}
        hrefFor={(next) => hrefWith("/fleet", params, { page: next })}
      />
    </>
  );
}

function NoAssets({ narrowed }: { narrowed: boolean }) {
  return narrowed ? (
    <EmptyState
      title="No asset is like that."
      action={<LinkButton href="/fleet">Show all</LinkButton>}
    >
      Take a filter off, or search for less of the word.
    </EmptyState>
  ) : (
    <EmptyState
      title="The register is empty."
      action={
        <>
          <LinkButton href="/import">Import a CSV file</LinkButton>
          <LinkButton href="/fleet/new">Add an asset</LinkButton>
        </>
      }
    >
      Begin with cell types and device models; then sites and assets, then what is in them.
    </EmptyState>
  );
}

const COLUMNS: readonly Column<FleetRow>[] = [
  {
    key: "tag",
    head: "Asset",
    sortKey: "tag",
    rowHeader: true,
    cell: (row) => <TagLink tag={row.tag} />,
  },
  {
    key: "name",
    head: "Name",
    sortKey: "name",
    cell: (row) => <span className="block max-w-60 truncate">{row.name}</span>,
  },
  {
    key: "site",
    head: "Site",
    sortKey: "site",
    cell: (row) => (
      <Link
        href={`/fleet/sites/${encodeURIComponent(row.siteCode)}`}
        prefetch={false}
        className="block max-w-48 truncate hover:underline"
      >
        {row.site}
      </Link>
    ),
  },
  {
    key: "model",
    head: "Model",
    sortKey: "model",
    wideOnly: true,
    cell: (row) => <span className="block max-w-44 truncate text-soft">{row.model}</span>,
  },
  {
    key: "pack",
    head: "Pack",
    sortKey: "pack",
    cell: (row) => <span className="font-cond text-soft">{row.pack}</span>,
  },
  {
    key: "left",
    head: "Left",
    sortKey: "left",
    cell: ({ disc }) =>
      disc ? (
        <span className="inline-flex items-center gap-2">
          <WaneDisc model={disc} decorative /> {disc.label}
        </span>
      ) : (
        <span className="text-soft">{NOTHING}</span>
      ),
  },
  {
    key: "likely",
    head: "Cut-off window",
    sortKey: "likely",
    cell: ({ window }) =>
      window ? (
        <>
          {window.from} – <b>{window.likely}</b> – {window.to}
        </>
      ) : (
        <span className="text-soft">{NOTHING}</span>
      ),
  },
  {
    key: "reading",
    head: "Last voltage",
    sortKey: "reading",
    cell: (row) => <span className="font-cond">{row.reading}</span>,
  },
  { key: "state", head: "State", sortKey: "state", wideOnly: true, cell: (row) => row.state },
];

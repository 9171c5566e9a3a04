import Link from "next/link";
import { PickFilter } from "@/components/forms/pick-filter";
import { SearchBox } from "@/components/forms/search-box";
import { LinkButton } from "@/components/ui/button";
import { FilterBar } from "@/components/ui/chip-link";
import { type Column, DataTable } from "@/components/ui/data-table";
import { Pager } from "@/components/ui/pager";
import { EmptyState } from "@/components/ui/states";
import { NOTHING } from "@/lib/present/locale";
import { hrefWith, pageSummary } from "@/lib/present/paging";
import type { SiteListView } from "@/lib/usecases/list-sites";
import type { ListParams } from "./fleet-params";
import { plain } from "./fleet-words";

type SiteRow = SiteListView["rows"][number];

/** One page of sites. */
export function SiteTable({ view, params }: { view: SiteListView; params: ListParams }) {
  const { page, pageSize, total, organisation } = view;
  const crews = view.crews.map(({ id, name }) => ({ value: id, label: name }));
  const summary = pageSummary(page, pageSize, total, "sites", organisation.locale);
  return (
    <>
      <FilterBar>
        <SearchBox path="/fleet/sites" label="Code or name" params={params} />
        <PickFilter
          {...{ path: "/fleet/sites", params, name: "crew", label: "Crew", all: "All crews" }}
          choices={crews}
        />
      </FilterBar>
      <DataTable
        caption="Sites"
        columns={COLUMNS}
        rows={view.rows}
        rowKey={(row) => row.id}
        sort={{
          key: params.order ?? "code",
          direction: params.dir === "desc" ? "descending" : "ascending",
          hrefFor: (order, direction) =>
            hrefWith("/fleet/sites", params, {
              order,
              dir: direction === "descending" ? "desc" : null,
            }),
        }}
        empty={
          <EmptyState
            title="No site is like that."
            action={<LinkButton href="/fleet/sites">Show all</LinkButton>}
          >
            Sites come with an assets file, or one by one.
          </EmptyState>
        }
      />
      <Pager
        page={page}
        pageCount={Math.max(1, Math.ceil(total / pageSize))}
        summary={summary}
        hrefFor={(next) => hrefWith("/fleet/sites", params, { page: next })}
      />
    </>
  );
}

const COLUMNS: readonly Column<SiteRow>[] = [
  {
    key: "code",
    head: "Code",
    sortKey: "code",
    rowHeader: true,
    cell: (row) => (
      <Link
        href={`/fleet/sites/${encodeURIComponent(row.code)}`}
        prefetch={false}
        className="font-mono text-xs font-semibold hover:underline"
      >
        {row.code}
      </Link>
    ),
  },
  { key: "name", head: "Name", sortKey: "name", cell: (row) => row.name },
  { key: "crew", head: "Crew", sortKey: "crew", cell: (row) => row.crewName ?? NOTHING },
  {
    key: "notice",
    head: "Notice",
    sortKey: "notice",
    align: "right",
    cell: (row) => (row.noticeDays > 0 ? `${row.noticeDays} days` : NOTHING),
  },
  {
    key: "hours",
    head: "Hours",
    cell: (row) =>
      row.opens && row.closes
        ? `${row.opens.slice(0, 5)}–${row.closes.slice(0, 5)}`
        : row.closures > 0
          ? ""
          : NOTHING,
  },
  {
    key: "closed",
    head: "Closed seasons",
    align: "right",
    wideOnly: true,
    cell: (row) => (row.closures > 0 ? String(row.closures) : NOTHING),
  },
  {
    key: "hazards",
    head: "Hazards",
    cell: (row) => (
      <span className="block max-w-72 truncate text-soft">
        {row.hazards.map(plain).join(", ") || NOTHING}
      </span>
    ),
  },
  {
    key: "assets",
    head: "Assets",
    sortKey: "assets",
    align: "right",
    cell: (row) => (
      <Link
        href={hrefWith("/fleet", {}, { site: row.code })}
        prefetch={false}
        className="text-dusk-ink hover:underline"
      >
        {row.assets}
      </Link>
    ),
  },
];

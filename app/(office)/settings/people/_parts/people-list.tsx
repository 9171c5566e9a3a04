import Link from "next/link";
import { LinkButton } from "@/components/ui/button";
import { ChipLink, FilterBar } from "@/components/ui/chip-link";
import { type Column, DataTable } from "@/components/ui/data-table";
import { PageHead } from "@/components/ui/page-head";
import { Pager } from "@/components/ui/pager";
import { EmptyState } from "@/components/ui/states";
import { formatInstant } from "@/lib/present/format-time";
import { NOTHING } from "@/lib/present/locale";
import { hrefWith, pageSummary } from "@/lib/present/paging";
import { roleNames } from "@/lib/present/role-names";
import type { PeopleView } from "@/lib/usecases/list-people";
import { SearchForm } from "../../_parts/search-form";
import { InvitePerson } from "./invite-person";

type Row = PeopleView["rows"][number];

const PATH = "/settings/people";
const STATES = [
  { state: "active", label: "Active" },
  { state: "invited", label: "Invited" },
  { state: "off", label: "Switched off" },
] as const;
const ROLE_CHIPS = ["administrator", "dispatcher", "supervisor", "technician"] as const;

/** The people with search, filters, sorting and pages in the address. */
export function PeopleList({ view }: { view: PeopleView }) {
  const { given, organisation, total, pageSize } = view;
  const current = {
    ...{ search: given.search, role: given.role ?? "", state: given.state ?? "" },
    ...{ order: given.order === "name" ? "" : given.order, down: given.descending ? "1" : "" },
  };
  const href = (changes: Record<string, string | number | null>) =>
    hrefWith(PATH, current, changes);
  return (
    <>
      <PageHead
        title="People"
        lede="Who signs in here and what they may do."
        actions={
          <>
            <LinkButton href={hrefWith("/api/v1/exports/people", current, {})} download>
              Export CSV
            </LinkButton>
            <InvitePerson />
          </>
        }
      />
      <FilterBar
        actions={
          <SearchForm
            path={PATH}
            label="Name or mail address"
            search={given.search}
            keep={{ role: given.role, state: given.state }}
          />
        }
      >
        {STATES.map(({ state, label }) => (
          <ChipLink
            key={state}
            href={href({ state: given.state === state ? null : state })}
            active={given.state === state}
          >
            {label}
          </ChipLink>
        ))}
        {ROLE_CHIPS.map((role) => (
          <ChipLink
            key={role}
            href={href({ role: given.role === role ? null : role })}
            active={given.role === role}
          >
            {roleNames([role])}
          </ChipLink>
        ))}
      </FilterBar>
      <DataTable
        caption="People"
        columns={columns(view)}
        rows={view.rows}
        rowKey={(row) => row.id}
        sort={{
          key: given.order,
          direction: given.descending ? "descending" : "ascending",
          hrefFor: (key, direction) =>
            href({ order: key, down: direction === "descending" ? "1" : null }),
        }}
        empty={
          <EmptyState title="Nobody fits these filters.">
            Take a filter off, or invite the person you are looking for.
          </EmptyState>
        }
      />
      <Pager
        page={given.page}
        pageCount={Math.max(1, Math.ceil(total / pageSize))}
        summary={pageSummary(given.page, pageSize, total, "people", organisation.locale)}
        hrefFor={(page) => href({ page })}
      />
    </>
  );
}

function columns({ organisation }: PeopleView): Column<Row>[] {
  const when = (at: Date | null) => (at ? formatInstant(at, organisation) : NOTHING);
  return [
    {
      ...{ key: "name", head: "Name", sortKey: "name", rowHeader: true },
      cell: (row) => (
        <Link className="textlink" href={`${PATH}/${row.id}`}>
          {row.name}
        </Link>
      ),
    },
    { key: "email", head: "Mail address", sortKey: "email", cell: (row) => row.email },
    { key: "roles", head: "Roles", cell: (row) => roleNames(row.roles) },
    { key: "state", head: "State", cell: (row) => stateWords(row, when) },
    { key: "seen", head: "Last sign-in", sortKey: "seen", cell: (row) => when(row.lastSeenAt) },
  ];
}

function stateWords(row: Row, when: (at: Date | null) => string) {
  if (row.state === "off") return <span className="text-brick-ink">switched off</span>;
  if (row.state === "active") return "active";
  return <span className="text-honey-ink">invited {when(row.invitedAt)}</span>;
}

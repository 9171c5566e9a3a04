import { LinkButton } from "@/components/ui/button";
import { type Column, DataTable } from "@/components/ui/data-table";
import { PageHead } from "@/components/ui/page-head";
import { Pager } from "@/components/ui/pager";
import { EmptyState } from "@/components/ui/states";
import { actLabel, detailLine } from "@/lib/present/act-label";
import { formatInstant } from "@/lib/present/format-time";
import { NOTHING } from "@/lib/present/locale";
import { hrefWith, pageSummary } from "@/lib/present/paging";
import type { AuditView } from "@/lib/usecases/list-audit";
import { AuditFilter } from "./audit-filter";

type Row = AuditView["rows"][number];

/** Who did what, newest first; nothing here can be changed. */
export function AuditLog({ view }: { view: AuditView }) {
  const { given, organisation, total, pageSize } = view;
  const current = {
    ...{ act: given.act ?? "", person: given.personId ?? "" },
    ...{ from: given.fromDay ?? "", to: given.toDay ?? "" },
  };
  return (
    <>
      <PageHead
        title="Who did what"
        lede="Every change and every sign-in. Entries are only added, never changed or removed."
        actions={
          <LinkButton href={hrefWith("/api/v1/exports/audit", current, {})} download>
            Export CSV
          </LinkButton>
        }
      />
      <AuditFilter view={view} />
      <DataTable
        caption="Who did what"
        rows={view.rows}
        rowKey={(row) => String(row.id)}
        columns={columns(view)}
        empty={<EmptyState title="Nothing fits these filters.">Take one off.</EmptyState>}
      />
      <Pager
        page={given.page}
        pageCount={Math.max(1, Math.ceil(total / pageSize))}
        summary={pageSummary(given.page, pageSize, total, "entries", organisation.locale)}
        hrefFor={(page) => hrefWith("/settings/audit", current, { page })}
      />
    </>
  );
}

function columns({ organisation }: AuditView): Column<Row>[] {
  return [
    {
      ...{ key: "at", head: "When", rowHeader: true },
      cell: (row) => formatInstant(row.at, organisation, { year: true }),
    },
    { key: "who", head: "Who", cell: who },
    { key: "act", head: "What", cell: (row) => actLabel(row.act) },
    {
      ...{ key: "subject", head: "On" },
      cell: (row) =>
        `${row.subjectKind.replaceAll("_", " ")}${row.subjectLabel ? ` ${row.subjectLabel}` : ""}`,
    },
    {
      ...{ key: "detail", head: "Besides" },
      cell: (row) => (
        <span className="inline-block max-w-xl py-1 whitespace-normal text-soft">
          {detailLine(row.detail) || NOTHING}
        </span>
      ),
    },
  ];
}

function who(row: Row): string {
  if (row.personName) return row.personName;
  if (row.apiKeyName) return `API key ${row.apiKeyName}`;
  return row.act === "sign-in-refused" || row.act.startsWith("request-")
    ? "not signed in"
    : "the application";
}

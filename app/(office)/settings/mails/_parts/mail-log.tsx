import { LinkButton } from "@/components/ui/button";
import { ChipLink, FilterBar } from "@/components/ui/chip-link";
import { type Column, DataTable } from "@/components/ui/data-table";
import { Notice } from "@/components/ui/notice";
import { PageHead } from "@/components/ui/page-head";
import { Pager } from "@/components/ui/pager";
import { EmptyState } from "@/components/ui/states";
import { formatInstant } from "@/lib/present/format-time";
import { hrefWith, pageSummary } from "@/lib/present/paging";
import type { MailsView } from "@/lib/usecases/list-mails";
import { SearchForm } from "../../_parts/search-form";
import { RetryMail } from "./retry-mail";

type Row = MailsView["rows"][number];

const PATH = "/settings/mails";
const STATES = [
  { state: "failed", label: "Failed" },
  { state: "queued", label: "Waiting" },
  { state: "sent", label: "Sent" },
] as const;

/** What went out, what waits and what failed, and why. */
export function MailLog({ view }: { view: MailsView }) {
  const { given, organisation, counts, total, pageSize } = view;
  const current = { search: given.search, state: given.state ?? "" };
  const href = (changes: Record<string, string | number | null>) =>
    hrefWith(PATH, current, changes);
  return (
    <>
      <PageHead
        title="Mails"
        lede="Every mail this application sent or tried to send."
        actions={
          <LinkButton href={hrefWith("/api/v1/exports/mails", current, {})} download>
            Export CSV
          </LinkButton>
        }
      />
      {(counts.failed ?? 0) > 0 && given.state !== "failed" && (
        <Notice kind="trouble">
          {counts.failed === 1 ? "One mail has" : `${counts.failed} mails have`} failed; choose
          “Failed” to see why and to try again.
        </Notice>
      )}
      <FilterBar
        actions={
          <SearchForm
            path={PATH}
            label="Address or subject"
            search={given.search}
            keep={{ state: given.state }}
          />
        }
      >
        {STATES.map(({ state, label }) => (
          <ChipLink
            key={state}
            href={href({ state: given.state === state ? null : state })}
            active={given.state === state}
            count={counts[state] ?? 0}
          >
            {label}
          </ChipLink>
        ))}
      </FilterBar>
      <DataTable
        caption="Mails"
        rows={view.rows}
        rowKey={(row) => row.id}
        columns={columns(view)}
        empty={
          <EmptyState title="No mail here.">
            Invitations, links, rounds and digests appear here as soon as they are ordered.
          </EmptyState>
        }
      />
      <Pager
        page={given.page}
        pageCount={Math.max(1, Math.ceil(total / pageSize))}
        summary={pageSummary(given.page, pageSize, total, "mails", organisation.locale)}
        hrefFor={(page) => href({ page })}
      />
    </>
  );
}

function columns({ organisation }: MailsView): Column<Row>[] {
  return [
    {
      ...{ key: "at", head: "Ordered", rowHeader: true },
      cell: (row) => formatInstant(row.createdAt, organisation),
    },
    { key: "to", head: "To", cell: (row) => row.toEmail },
    {
      ...{ key: "subject", head: "Subject" },
      cell: (row) => (
        <span className="inline-block max-w-96 min-w-64 whitespace-normal">{row.subject}</span>
      ),
    },
    { key: "state", head: "State", cell: (row) => <State row={row} view={organisation} /> },
    {
      ...{ key: "acts", head: <span className="sr-only">Acts</span>, align: "right" },
      cell: (row) =>
        (row.state === "failed" || (row.state === "queued" && row.attempts > 0)) && (
          <RetryMail id={row.id} to={row.toEmail} />
        ),
    },
  ];
}

function State({ row, view }: { row: Row; view: MailsView["organisation"] }) {
  if (row.state === "sent" && row.sentAt) return `sent ${formatInstant(row.sentAt, view)}`;
  const tried = row.attempts === 1 ? "once" : `${row.attempts} times`;
  const failed = row.state === "failed";
  if (!failed && row.attempts === 0) return "waiting";
  return (
    <span className="inline-block max-w-md py-1 whitespace-normal">
      <span className={failed ? "font-medium text-brick-ink" : "text-honey-ink"}>
        {failed ? "failed" : "will be tried again"}
      </span>
      , tried {tried}
      {row.lastError && <span className="text-soft">: {row.lastError}</span>}
    </span>
  );
}

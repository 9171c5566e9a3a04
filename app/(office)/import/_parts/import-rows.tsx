import { ChipLink, FilterBar } from "@/components/ui/chip-link";
import { type Column, DataTable } from "@/components/ui/data-table";
import { Pager } from "@/components/ui/pager";
import { hrefWith, pageSummary } from "@/lib/present/paging";
import type { ImportView } from "@/lib/usecases/read-import";

const OUTCOMES = ["new", "changed", "same", "refused"] as const;
type Row = ImportView["rows"][number];

/** Each row of the file and what it does. */
export function ImportRows({ view }: { view: ImportView }) {
  const { run, show, page, pageSize, rowsShown, organisation } = view;
  const path = `/import/${run.id}`;
  const params = { show: show ?? undefined };
  return (
    <>
      <FilterBar>
        {OUTCOMES.map((outcome) => (
          <ChipLink
            key={outcome}
            href={hrefWith(path, params, { show: show === outcome ? null : outcome })}
            active={show === outcome}
            count={run.report?.counts[outcome] ?? 0}
          >
            {outcome}
          </ChipLink>
        ))}
      </FilterBar>
      <DataTable
        caption="Rows of the file"
        columns={columns(view)}
        rows={view.rows}
        rowKey={(row) => String(row.row)}
        empty="No row does that."
      />
      <Pager
        page={page}
        pageCount={Math.max(1, Math.ceil(rowsShown / pageSize))}
        summary={pageSummary(page, pageSize, rowsShown, "rows", organisation.locale)}
        hrefFor={(next) => hrefWith(path, params, { page: next })}
      />
    </>
  );
}

function columns({ head, run }: ImportView): Column<Row>[] {
  const notes = run.report?.notes ?? {};
  return [
    { key: "row", head: "Row", align: "right", rowHeader: true, cell: (row) => row.row },
    {
      key: "outcome",
      head: run.state === "imported" ? "Was" : "Would be",
      cell: (row) => (
        <span className={row.outcome === "refused" ? "font-medium text-brick-ink" : ""}>
          {row.outcome}
        </span>
      ),
    },
    {
      key: "note",
      head: "How",
      cell: (row) => (
        <span className="block max-w-96 min-w-40 py-1 whitespace-normal text-soft">
          {notes[row.row]}
        </span>
      ),
    },
    ...head.slice(0, 8).map((name, n): Column<Row> => ({
      key: `cell-${n}`,
      head: name,
      wideOnly: n > 3,
      cell: (row) => <span className="block max-w-44 truncate font-cond">{row.cells[n]}</span>,
    })),
  ];
}

import { type Column, DataTable } from "@/components/ui/data-table";
import { formatInstant } from "@/lib/present/format-time";
import type { FieldMatter, FieldMatters } from "@/lib/usecases/list-field-matters";
import { matterWords, OUTCOMES } from "./matter-words";

/** What was decided lately, by whom and why. */
export function ClosedMatters({ matters }: { matters: FieldMatters }) {
  if (matters.closed.length === 0) return null;
  return (
    <DataTable
      caption="Decided lately"
      showCaption
      columns={columns(matters)}
      rows={matters.closed}
      rowKey={(row) => row.id}
    />
  );
}

function columns(matters: FieldMatters): Column<FieldMatter>[] {
  const { organisation } = matters;
  return [
    {
      key: "closed",
      head: "When",
      rowHeader: true,
      cell: (row) => row.closedAt && formatInstant(row.closedAt, organisation),
    },
    { key: "what", head: "What", cell: (row) => matterWords(row, matters).title },
    { key: "kind", head: "Kind", cell: (row) => matterWords(row, matters).kind },
    { key: "from", head: "From", cell: (row) => row.personName },
    { key: "outcome", head: "Decided", cell: (row) => OUTCOMES[row.outcome ?? ""] ?? "" },
    { key: "by", head: "By", cell: (row) => row.closedBy ?? "" },
    {
      key: "note",
      head: "Why",
      cell: (row) => <span className="block max-w-80 whitespace-normal text-soft">{row.note}</span>,
    },
  ];
}

import Link from "next/link";
import { type Column, DataTable } from "@/components/ui/data-table";
import { formatInstant } from "@/lib/present/format-time";
import { formatNumber, NOTHING } from "@/lib/present/locale";
import type { ImportListView } from "@/lib/usecases/read-import";
import { KIND_WORDS, STATE_WORDS } from "./import-words";

type Run = ImportListView["runs"][number];

/** The latest imports. */
export function ImportList({ view }: { view: ImportListView }) {
  return (
    <DataTable
      caption="Latest imports"
      showCaption
      columns={columns(view)}
      rows={view.runs}
      rowKey={(run) => run.id}
      empty="Nothing has been imported yet."
    />
  );
}

function columns({ organisation }: ImportListView): Column<Run>[] {
  const { locale } = organisation;
  const count = (n: number | undefined) => (n === undefined ? NOTHING : formatNumber(n, locale));
  return [
    {
      key: "file",
      head: "File",
      rowHeader: true,
      cell: (run) => (
        <Link href={`/import/${run.id}`} className="font-medium hover:underline">
          {run.fileName}
        </Link>
      ),
    },
    { key: "kind", head: "Holds", cell: (run) => KIND_WORDS[run.kind] ?? run.kind },
    { key: "state", head: "State", cell: (run) => STATE_WORDS[run.state] ?? run.state },
    { key: "new", head: "New", align: "right", cell: (run) => count(run.counts?.new) },
    { key: "changed", head: "Changed", align: "right", cell: (run) => count(run.counts?.changed) },
    { key: "refused", head: "Refused", align: "right", cell: (run) => count(run.counts?.refused) },
    { key: "when", head: "Sent", cell: (run) => formatInstant(run.createdAt, organisation) },
    { key: "by", head: "By", cell: (run) => run.createdByName },
  ];
}

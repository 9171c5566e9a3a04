import { ErrorPanel } from "@/components/ui/states";
import { Figure, FigureRow } from "@/components/ui/figure";
import { DataTable } from "@/components/ui/data-table";
import { Notice } from "@/components/ui/notice";
import { formatNumber } from "@/lib/present/locale";
import type { ImportView } from "@/lib/usecases/read-import";
import { ApplyForm } from "./apply-form";

const SHOWN_FAULTS = 100;

/** What the file would do, or did; what is wrong, by row and column. */
export function ImportReport({ view }: { view: ImportView }) {
  const { run, organisation } = view;
  const { report } = run;
  if (!report) return null;
  if (report.trouble) {
    return (
      <div className="mb-5 max-w-3xl">
        <ErrorPanel
          title={report.trouble}
          kept="Nothing of this file was written."
          todo="Mend the settings below, or the file, and look at it again."
        />
      </div>
    );
  }
  const number = (n: number) => formatNumber(n, organisation.locale);
  const { counts } = report;
  const done = run.state === "imported";
  return (
    <>
      <FigureRow actions={!done && <ApplyForm importId={run.id} counts={counts} />}>
        <Figure label={done ? "Were new" : "Would be new"} value={number(counts.new)} />
        <Figure label={done ? "Were changed" : "Would change"} value={number(counts.changed)} />
        <Figure label="Same as now" value={number(counts.same)} tone="quiet" />
        <Figure
          label="Refused"
          value={number(counts.refused)}
          tone={counts.refused > 0 ? "out" : "quiet"}
        />
      </FigureRow>
      {done && (
        <Notice kind="done">Imported in one go. The same file again changes nothing.</Notice>
      )}
      {report.faults.length > 0 && <Faults report={report} total={number(report.faultsTotal)} />}
    </>
  );
}

type Report = NonNullable<ImportView["run"]["report"]>;

function Faults({ report, total }: { report: Report; total: string }) {
  const shown = report.faults.slice(0, SHOWN_FAULTS);
  const more = report.faultsTotal > shown.length;
  return (
    <div className="mb-5">
      <DataTable
        caption={more ? `What is wrong: the first ${SHOWN_FAULTS} of ${total}` : "What is wrong"}
        showCaption
        rows={shown.map((fault, n) => ({ ...fault, key: String(n) }))}
        rowKey={(fault) => fault.key}
        columns={[
          { key: "row", head: "Row", align: "right", rowHeader: true, cell: (f) => f.row },
          { key: "column", head: "Column", cell: (f) => f.column },
          {
            key: "message",
            head: "What to mend",
            cell: (f) => <span className="block py-1 whitespace-normal">{f.message}</span>,
          },
        ]}
      />
    </div>
  );
}

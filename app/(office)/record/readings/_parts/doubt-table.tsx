import Link from "next/link";
import { type Column, DataTable } from "@/components/ui/data-table";
import { EmptyState } from "@/components/ui/states";
import { formatVoltBand, formatVolts } from "@/lib/present/format-quantity";
import { formatPercent } from "@/lib/present/format-share";
import { formatInstant } from "@/lib/present/format-time";
import { formatNumber, NOTHING } from "@/lib/present/locale";
import { readingReason, readingSource } from "@/lib/present/reading-words";
import type { ReadingsInDoubt } from "@/lib/usecases/list-readings-in-doubt";
import { VerdictDialog } from "../../../fleet/[tag]/_parts/verdict-dialog";

type Row = ReadingsInDoubt["rows"][number];

/** Readings nobody has judged yet, newest first, each with a way to confirm or correct it. */
export function DoubtTable({ view, mayJudge }: { view: ReadingsInDoubt; mayJudge: boolean }) {
  const { locale } = view.organisation;
  return (
    <>
      <p className="mb-2 text-soft" role="status">
        {view.rows.length < view.total
          ? `The newest ${formatNumber(view.rows.length, locale)} of ${formatNumber(view.total, locale)}`
          : `${formatNumber(view.total, locale)} in doubt`}
      </p>
      <DataTable
        caption="Readings in doubt, newest first"
        columns={columns(view, mayJudge)}
        rows={view.rows}
        rowKey={(row) => row.id}
        empty={
          <EmptyState title="No reading is in doubt.">
            Every voltage of the packs in service fits its curve, or somebody has said what to make
            of it.
          </EmptyState>
        }
      />
    </>
  );
}

function columns({ organisation }: ReadingsInDoubt, mayJudge: boolean): Column<Row>[] {
  const { locale } = organisation;
  const called = (row: Row) =>
    `${formatVolts(row.millivolts, locale)} of ${row.tag}, ${formatInstant(row.at, organisation)}`;
  const judge: Column<Row> = {
    key: "judge",
    head: <span className="sr-only">Verdict</span>,
    align: "right",
    cell: (row) => <VerdictDialog readingId={row.id} called={called(row)} />,
  };
  return [
    {
      key: "tag",
      head: "Asset",
      rowHeader: true,
      cell: (row) => (
        <Link href={`/fleet/${encodeURIComponent(row.tag)}`} className="hover:underline">
          <span className="font-mono text-xs font-semibold">{row.tag}</span>{" "}
          <span className="text-soft max-md:hidden">{row.assetName}</span>
        </Link>
      ),
    },
    { key: "at", head: "Read", cell: (row) => formatInstant(row.at, organisation) },
    {
      key: "volts",
      head: "Voltage",
      align: "right",
      cell: (row) => (
        <>
          <span className="font-mono text-xs font-semibold">
            {formatVolts(row.millivolts, locale)}
          </span>{" "}
          {row.kind === "loaded" ? "under load" : "resting"}
        </>
      ),
    },
    {
      key: "expected",
      head: "Expected",
      align: "right",
      cell: ({ expectedLowMv: low, expectedHighMv: high }) =>
        low === null || high === null ? NOTHING : formatVoltBand(Math.max(0, low), high, locale),
    },
    {
      key: "why",
      head: "Why in doubt",
      cell: (row) => (
        <span className="block min-w-52 py-1 whitespace-normal">
          {[row.doubt, row.reason && row.reason !== "fits" ? readingReason(row.reason) : ""]
            .filter(Boolean)
            .join("; ")}
        </span>
      ),
    },
    {
      key: "counts",
      head: "Counts",
      align: "right",
      cell: (row) => (row.weight === null ? NOTHING : formatPercent(row.weight, locale)),
    },
    {
      key: "by",
      head: "By",
      wideOnly: true,
      cell: (row) => row.personName ?? row.apiKeyName ?? readingSource(row.source),
    },
    ...(mayJudge ? [judge] : []),
  ];
}

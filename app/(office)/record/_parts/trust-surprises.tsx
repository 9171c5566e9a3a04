import Link from "next/link";
import { type Column, DataTable } from "@/components/ui/data-table";
import { Section } from "@/components/ui/page-head";
import { EmptyState } from "@/components/ui/states";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { formatDay, formatWindow } from "@/lib/present/format-day";
import { formatPercent } from "@/lib/present/format-share";
import { surpriseCause } from "@/lib/present/surprise-cause";
import type { TrustView } from "@/lib/usecases/read-trust";

type Surprise = TrustView["surprises"][number];

/** Packs that ended outside the window, or outlived it. */
export function TrustSurprises({ view }: { view: TrustView }) {
  return (
    <Section
      title="Packs that surprised"
      aside={`${view.surprises.length} of ${view.surprising} shown`}
    >
      <DataTable
        caption="Packs that surprised, newest first"
        columns={columns(view)}
        rows={view.surprises}
        rowKey={(row) => row.packId}
        empty={<EmptyState title="None: every end was within what had been said." />}
      />
    </Section>
  );
}

function columns(view: TrustView): Column<Surprise>[] {
  const { organisation, today } = view;
  const { locale, timeZone } = organisation;
  const day = (at: Date | null) =>
    at ? formatDay(dayOfInstant(at, timeZone), locale, { today }) : "";
  return [
    {
      key: "tag",
      head: "Asset",
      rowHeader: true,
      cell: (row) => (
        <Link
          href={`/fleet/${encodeURIComponent(row.tag)}`}
          className="font-mono text-xs font-semibold hover:underline"
        >
          {row.tag}
        </Link>
      ),
    },
    { key: "model", head: "Model", cell: (row) => row.modelName },
    { key: "cell", head: "Cell", cell: (row) => row.designation },
    { key: "said", head: "Said on", cell: (row) => day(row.madeAt) },
    {
      key: "window",
      head: "Window said",
      cell: (row) =>
        formatWindow(
          {
            p5: dayOfInstant(row.window.p05, timeZone),
            p50: dayOfInstant(row.window.p50, timeZone),
            p95: dayOfInstant(row.window.p95, timeZone),
          },
          locale,
          today,
        ).text,
    },
    {
      key: "chance",
      head: "Chance by then",
      align: "right",
      cell: (row) => formatPercent(row.life.chance, locale),
    },
    { key: "found", head: "Found", cell: (row) => `${howEnded(row)} ${day(row.endedAt)}`.trim() },
    {
      key: "cause",
      head: "Likely cause",
      cell: (row) => (
        <span className="block min-w-44 py-1 whitespace-normal">{causeOf(row, view)}</span>
      ),
    },
  ];
}

function howEnded(row: Surprise): string {
  if (row.endedAt === null) return "still running";
  return row.stopped ? "stopped" : "taken out alive";
}

function causeOf(row: Surprise, { organisation, today }: TrustView): string {
  const { locale, timeZone } = organisation;
  const { facts } = row;
  const told = {
    ...{ readings: facts?.readings ?? 0, monthlyMeanDc: facts?.monthlyMeanDc ?? null },
    ...{ weakLot: facts?.weakLot ?? null, drawShiftSince: facts?.drawShiftSince ?? null },
    drawFactor: facts?.drawFactor ?? null,
  };
  const endedOn = row.endedAt ? dayOfInstant(row.endedAt, timeZone) : today;
  // one that stopped after its window outlived it as well
  const stopped = row.life.ended && row.life.chance < 0.5;
  return surpriseCause({ ...told, endedOn, stopped, reasonOut: row.reasonOut }, locale);
}

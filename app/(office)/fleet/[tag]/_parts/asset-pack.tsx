import { SpanStrip } from "@/components/charts/span-strip";
import { VoltageChart } from "@/components/charts/voltage-chart";
import { WaneDisc } from "@/components/charts/wane-disc";
import { Figure, FigureRow } from "@/components/ui/figure";
import { Section } from "@/components/ui/page-head";
import { EmptyState } from "@/components/ui/states";
import { formatDay } from "@/lib/present/format-day";
import type { Explanation } from "@/lib/usecases/explain-forecast";
import type { AssetView } from "@/lib/usecases/read-asset";
import { assetMarks } from "./asset-marks";
import { AssetReasons } from "./asset-reasons";

/** The pack now: what is left, when it will stop, on what that rests. */
export function AssetPack(props: { view: AssetView; explanation: Explanation | null }) {
  const { view, explanation } = props;
  const marks = assetMarks(view, explanation);
  if (!marks) {
    return (
      <Section title="Pack">
        <EmptyState title="No pack is in this asset.">
          Record the install when cells go in; the first forecast follows within a minute.
        </EmptyState>
      </Section>
    );
  }
  return (
    <>
      <FigureRow>
        <Figure
          label="Charge left"
          value={marks.disc.label}
          range={
            <>
              <WaneDisc model={marks.disc} decorative />{" "}
              {marks.shareRange && `likely ${marks.shareRange}`}
            </>
          }
          tone={marks.tone}
        />
        <Figure
          label="Likely cut-off"
          value={marks.window?.likely ?? "not known"}
          range={marks.window ? `${marks.window.from} – ${marks.window.to}` : "no forecast yet"}
          tone={marks.tone}
        />
        <Figure
          label="From today"
          value={marks.away ?? "—"}
          range={marks.stale && "being renewed"}
        />
        <Figure label="Pack" value={marks.label} range={`since ${marks.since}`} />
        <Figure label="Stops at" value={marks.cutoffVolts} range="under its peak current" />
      </FigureRow>
      <Section title="Voltages over time" aside={<NextVisit view={view} />}>
        <div
          role="region"
          aria-label="Charts"
          tabIndex={0}
          className="relative overflow-x-auto px-3 py-3"
        >
          {/* As wide as it is drawn: the strip and the voltages share one axis. */}
          <div style={{ width: marks.chart.width }}>
            <div style={{ paddingLeft: marks.chart.plot.left }}>
              <SpanStrip scale={marks.scale} model={marks.strip} />
            </div>
            <VoltageChart model={marks.chart} />
          </div>
        </div>
      </Section>
      <AssetReasons view={view} explanation={explanation} />
    </>
  );
}

function NextVisit({ view }: { view: AssetView }) {
  const { visits, organisation, now } = view;
  const today = now.toISOString().slice(0, 10);
  const next = visits.findLast((v) => v.day >= today && v.taskState === "planned");
  if (!next) return <>no visit booked</>;
  const day = formatDay(next.day, organisation.locale, { weekday: true, today });
  const how = next.roundState === "proposed" ? "proposed for" : "booked for";
  return (
    <>
      visit {how} {day}, {next.technicianName}
    </>
  );
}

import { ChartFrame } from "@/components/charts/frame";
import type { VoltagePlateModel } from "@/lib/present/voltage-plate";

export interface VoltagePlateProps {
  model: VoltagePlateModel;
  decorative?: boolean;
}

/** A reading against the expected band and the cut-off. The verdict's words stand beside it. */
export function VoltagePlate({ model, decorative }: VoltagePlateProps) {
  const { width, height, baseline, band, cutoffX, readingX } = model;
  return (
    <ChartFrame
      title={model.title}
      description={model.description}
      viewBox={`0 0 ${width} ${height}`}
      decorative={decorative}
      className="block w-full max-w-md font-cond text-base"
    >
      {band && (
        <rect
          x={band.x}
          y={baseline - 28}
          width={Math.max(1, band.width)}
          height={28}
          className="fill-spruce-tint stroke-spruce-line"
        />
      )}
      <line
        x1={cutoffX}
        x2={cutoffX}
        y1={8}
        y2={baseline}
        className="stroke-brick-line"
        strokeWidth="2"
        strokeDasharray="4 3"
      />
      <text
        x={cutoffX + (model.cutoffAnchor === "start" ? 5 : -5)}
        y={16}
        textAnchor={model.cutoffAnchor}
        className="fill-brick-ink"
      >
        cut-off
      </text>
      <line x1="0" x2={width} y1={baseline} y2={baseline} className="stroke-ink" />
      <Scale model={model} />
      {readingX !== null && (
        <circle
          cx={readingX}
          cy={baseline - 14}
          r="7.5"
          className="fill-ink stroke-paper"
          strokeWidth="1.5"
        />
      )}
    </ChartFrame>
  );
}

function Scale({ model }: { model: VoltagePlateModel }) {
  const { baseline } = model;
  return model.ticks.map((tick, i) => (
    <g key={tick.x}>
      <line x1={tick.x} x2={tick.x} y1={baseline} y2={baseline + 5} className="stroke-ink" />
      <text
        x={tick.x}
        y={baseline + 20}
        textAnchor={tick.anchor as "start" | "middle" | "end"}
        className="fill-soft"
      >
        {tick.label}
        {i === model.ticks.length - 1 && " V"}
      </text>
    </g>
  ));
}

import type { ReactNode } from "react";
import { ChartFrame } from "@/components/charts/frame";
import type { PlotDot, VoltageChartModel } from "@/lib/present/voltage-chart";

/** An asset's voltages over time, with the key to its marks. */
export function VoltageChart({ model }: { model: VoltageChartModel }) {
  return (
    <figure>
      <Plot model={model} />
      <figcaption className="mt-1 flex flex-wrap gap-x-4 pl-3 text-sm text-soft">
        <Key mark={<Dot dot={{ ...keyDot, kind: "resting" }} />}>resting</Key>
        <Key mark={<Dot dot={{ ...keyDot, kind: "loaded" }} />}>under load</Key>
        <Key mark={<Dot dot={{ ...keyDot, kind: "resting", doubtful: true }} />}>
          kept, but unlikely
        </Key>
        {model.bandPath && (
          <Key mark={<rect y="3" width="16" height="10" className="fill-spruce-tint" />}>
            expected at rest
          </Key>
        )}
        {model.installXs.length > 0 && (
          <Key mark={<line x1="8" x2="8" y2="16" className="stroke-dusk-line" />}>pack put in</Key>
        )}
      </figcaption>
    </figure>
  );
}

const keyDot = { x: 8, y: 8, doubtful: false, label: "" };

function Key({ mark, children }: { mark: ReactNode; children: ReactNode }) {
  return (
    <span className="inline-flex items-center gap-1.5">
      <svg aria-hidden="true" width="16" height="16" viewBox="0 0 16 16">
        {mark}
      </svg>
      {children}
    </span>
  );
}

function Plot({ model }: { model: VoltageChartModel }) {
  const { plot } = model;
  return (
    <ChartFrame
      title={model.title}
      description={model.description}
      viewBox={`0 0 ${model.width} ${model.height}`}
      className="block w-full font-cond text-2xs"
    >
      <Rules model={model} />
      {model.bandPath && <path d={model.bandPath} className="fill-spruce-tint" />}
      {model.midPath && (
        <path d={model.midPath} className="fill-none stroke-spruce-line" strokeWidth="1.5" />
      )}
      <line
        x1={plot.left}
        x2={plot.right}
        y1={model.cutoffY}
        y2={model.cutoffY}
        className="stroke-brick-line"
        strokeWidth="1.5"
        strokeDasharray="5 3"
      />
      <text
        x={plot.right - 4}
        y={model.cutoffY - 4}
        textAnchor="end"
        className="fill-brick-ink stroke-sheet [paint-order:stroke]"
        strokeWidth="3"
      >
        {model.cutoffLabel}
      </text>
      {model.installXs.map((x) => (
        <line key={x} x1={x} x2={x} y1={plot.top} y2={plot.bottom} className="stroke-dusk-line" />
      ))}
      <line
        x1={model.nowX}
        x2={model.nowX}
        y1={plot.top}
        y2={plot.bottom}
        className="stroke-ink"
        strokeDasharray="2 2"
      />
      {model.dots.map((dot, i) => (
        <Dot key={i} dot={dot} />
      ))}
    </ChartFrame>
  );
}

function Rules({ model }: { model: VoltageChartModel }) {
  const { plot } = model;
  return (
    <>
      {model.yTicks.map((tick) => (
        <g key={tick.y}>
          <line x1={plot.left} x2={plot.right} y1={tick.y} y2={tick.y} className="stroke-hair" />
          <text x={plot.left - 6} y={tick.y + 4} textAnchor="end" className="fill-soft">
            {tick.label} V
          </text>
        </g>
      ))}
      <line
        x1={plot.left}
        x2={plot.right}
        y1={plot.bottom}
        y2={plot.bottom}
        className="stroke-ink"
      />
      {model.xTicks.map((tick) => (
        <g key={tick.x}>
          <line
            x1={tick.x}
            x2={tick.x}
            y1={plot.bottom}
            y2={plot.bottom + 6}
            className="stroke-ink"
          />
          <text x={tick.x + 4} y={plot.bottom + 16} className="fill-soft">
            {tick.label}
          </text>
        </g>
      ))}
    </>
  );
}

function Dot({ dot }: { dot: PlotDot }) {
  const { x, y } = dot;
  return (
    <g>
      {dot.label && <title>{dot.label}</title>}
      {dot.kind === "resting" ? (
        <circle cx={x} cy={y} r="3.6" className="fill-sheet stroke-ink" strokeWidth="1.4" />
      ) : (
        <rect x={x - 3} y={y - 3} width="6" height="6" className="fill-ink" />
      )}
      {dot.doubtful && (
        <path
          d={`M${x - 6} ${y - 6}l12 12m0-12l-12 12`}
          className="stroke-brick-line"
          strokeWidth="1.5"
        />
      )}
    </g>
  );
}

import { ChartFrame } from "@/components/charts/frame";
import { TickLines } from "@/components/charts/tick-lines";
import type { ReliabilityPlotModel } from "@/lib/present/reliability-plot";

/** Chance forecast across, share that came true upward. */
export function ReliabilityPlot({ model }: { model: ReliabilityPlotModel }) {
  const { plot, size } = model;
  return (
    <ChartFrame
      title={model.title}
      description={model.description}
      viewBox={`0 0 ${size} ${size}`}
      className="block w-full max-w-sm font-cond text-2xs"
    >
      <Grid model={model} />
      <path
        d={`M${plot.left} ${plot.bottom}L${plot.right} ${plot.top}`}
        className="stroke-soft"
        strokeDasharray="4 3"
      />
      {model.points.map((point) => (
        <g key={point.label}>
          <title>{point.label}</title>
          <line
            x1={point.x}
            x2={point.x}
            y1={point.lowY}
            y2={point.highY}
            className={point.sound ? "stroke-spruce-line" : "stroke-brick-line"}
            strokeWidth="1.5"
          />
          <circle
            cx={point.x}
            cy={point.y}
            r={point.r}
            className={point.sound ? "fill-spruce" : "fill-sheet stroke-brick-line"}
            strokeWidth="1.5"
          />
        </g>
      ))}
      <text
        x={(plot.left + plot.right) / 2}
        y={size - 20}
        textAnchor="middle"
        className="fill-soft"
      >
        chance forecast
      </text>
      <text
        transform={`translate(10 ${(plot.top + plot.bottom) / 2}) rotate(-90)`}
        textAnchor="middle"
        className="fill-soft"
      >
        share that came true
      </text>
    </ChartFrame>
  );
}

function Grid({ model }: { model: ReliabilityPlotModel }) {
  const { plot } = model;
  return (
    <>
      <TickLines plot={plot} ticks={model.ticks} />
      <path
        d={`M${plot.left} ${plot.top}V${plot.bottom}H${plot.right}`}
        className="fill-none stroke-ink"
      />
    </>
  );
}

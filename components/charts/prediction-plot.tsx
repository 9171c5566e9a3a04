import { ChartFrame } from "@/components/charts/frame";
import { TickLines } from "@/components/charts/tick-lines";
import type { PredictionPlotModel } from "@/lib/present/prediction-plot";

/** Days left as said across, as found upward; on the diagonal both agree. */
export function PredictionPlot({ model }: { model: PredictionPlotModel }) {
  const { plot, size } = model;
  return (
    <ChartFrame
      title={model.title}
      description={model.description}
      viewBox={`0 0 ${size} ${size}`}
      className="block w-full max-w-sm font-cond text-2xs"
    >
      <path d={model.corridor} className="fill-spruce-tint" />
      <TickLines plot={plot} ticks={model.ticks} />
      <path
        d={`M${plot.left} ${plot.bottom}L${plot.right} ${plot.top}`}
        className="stroke-soft"
        strokeDasharray="4 3"
      />
      {model.dots.map((dot) => (
        <circle
          key={dot.key}
          cx={dot.x}
          cy={dot.y}
          r="2.4"
          className={dot.stopped ? "fill-ink" : "fill-none stroke-spruce-line"}
        />
      ))}
      <path
        d={`M${plot.left} ${plot.top}V${plot.bottom}H${plot.right}`}
        className="fill-none stroke-ink"
      />
      <text
        x={(plot.left + plot.right) / 2}
        y={size - 20}
        textAnchor="middle"
        className="fill-soft"
      >
        days left as said
      </text>
      <text
        transform={`translate(10 ${(plot.top + plot.bottom) / 2}) rotate(-90)`}
        textAnchor="middle"
        className="fill-soft"
      >
        as found
      </text>
    </ChartFrame>
  );
}

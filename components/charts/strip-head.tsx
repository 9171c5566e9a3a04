import { ChartFrame } from "@/components/charts/frame";
import type { StripHeadModel, WeekBar } from "@/lib/present/strip-head";

/** The axis over a stack of strips: expected cut-offs a week with their spread, and the months. */
export function StripHead({ model }: { model: StripHeadModel }) {
  const { width, height, baseline, scaleLine, nowX } = model;
  return (
    <ChartFrame
      title={model.title}
      description={model.description}
      viewBox={`0 0 ${width} ${height}`}
      width={width}
      height={height}
      className="block font-cond text-2xs font-semibold tracking-normal normal-case"
    >
      {scaleLine && (
        <>
          <line x1="0" x2={width} y1={scaleLine.y} y2={scaleLine.y} className="stroke-hair" />
          <text
            x={Math.max(4, nowX - 6)}
            y={scaleLine.y + 4}
            textAnchor="end"
            className="fill-soft"
          >
            {scaleLine.label}
          </text>
        </>
      )}
      {model.bars.map((bar) => (
        <Bar key={bar.x} bar={bar} baseline={baseline} />
      ))}
      <line x1="0" x2={width} y1={baseline} y2={baseline} className="stroke-ink" />
      {model.months.map((month) => (
        <g key={month.x}>
          <line x1={month.x} x2={month.x} y1={baseline} y2={height} className="stroke-rule" />
          <text x={month.x + 4} y={height - 5} className="fill-soft">
            {month.label}
          </text>
        </g>
      ))}
      <line
        x1={nowX}
        x2={nowX}
        y1="2"
        y2={height}
        className="stroke-ink"
        strokeWidth="1.2"
        strokeDasharray="2 2"
      />
      {nowX > 110 && (
        <text x="6" y={baseline - 6} className="fill-soft">
          cut-offs a week
        </text>
      )}
    </ChartFrame>
  );
}

function Bar({ bar, baseline }: { bar: WeekBar; baseline: number }) {
  const middle = bar.x + bar.width / 2;
  return (
    <g>
      <rect
        x={bar.x}
        y={bar.top}
        width={bar.width}
        height={Math.max(0, baseline - bar.top)}
        className={bar.soon ? "fill-honey" : "fill-spruce opacity-30"}
      />
      <line x1={middle} x2={middle} y1={bar.highY} y2={bar.lowY} className="stroke-ink" />
    </g>
  );
}

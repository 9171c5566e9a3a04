import type { TimeAxis } from "@/lib/present/time-axis";

const HEIGHT = 22;

/** The months over a stack of strips, where no fleet stands behind them. Decorative: dates follow. */
export function StripAxis({ axis }: { axis: TimeAxis }) {
  return (
    <svg
      aria-hidden="true"
      width={axis.widthPx}
      height={HEIGHT}
      viewBox={`0 0 ${axis.widthPx} ${HEIGHT}`}
      className="block font-cond text-2xs font-semibold"
    >
      {axis.ticks.map((tick) => (
        <g key={tick.x}>
          <line x1={tick.x} x2={tick.x} y1="4" y2={HEIGHT} className="stroke-rule" />
          <text x={tick.x + 4} y={HEIGHT - 6} className="fill-soft">
            {tick.label}
          </text>
        </g>
      ))}
    </svg>
  );
}

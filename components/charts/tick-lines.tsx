export interface TickLinesProps {
  /** Edges of the plot within the picture. */
  plot: { left: number; right: number; top: number; bottom: number };
  /** The same marks across and upward. */
  ticks: readonly { x: number; y: number; label: string }[];
}

/** Lines and labels of a square plot that has one scale for both its axes. */
export function TickLines({ plot, ticks }: TickLinesProps) {
  return ticks.map((tick) => (
    <g key={tick.label}>
      <line x1={plot.left} x2={plot.right} y1={tick.y} y2={tick.y} className="stroke-hair" />
      <line x1={tick.x} x2={tick.x} y1={plot.top} y2={plot.bottom} className="stroke-hair" />
      <text x={plot.left - 6} y={tick.y + 4} textAnchor="end" className="fill-soft">
        {tick.label}
      </text>
      <text x={tick.x} y={plot.bottom + 16} textAnchor="middle" className="fill-soft">
        {tick.label}
      </text>
    </g>
  ));
}

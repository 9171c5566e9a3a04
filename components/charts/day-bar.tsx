import { ChartFrame } from "@/components/charts/frame";
import type { BarPart, DayBarModel } from "@/lib/present/day-bar";

/** A round to the scale of the shift; it stretches to the width of its place. */
export function DayBar({ model, decorative }: { model: DayBarModel; decorative?: boolean }) {
  const { width, height, shiftWidth } = model;
  return (
    <ChartFrame
      title={model.title}
      description={model.description}
      viewBox={`0 0 ${width} ${height}`}
      height={height}
      stretch
      decorative={decorative}
      className="block w-full"
    >
      <rect y="4" width={shiftWidth} height={height - 8} className="fill-hair" />
      {model.parts.map((part, i) => (
        <Part key={i} part={part} height={height} />
      ))}
      <line
        x1={shiftWidth}
        x2={shiftWidth}
        y2={height}
        className="stroke-ink"
        strokeWidth="1.5"
        vectorEffect="non-scaling-stroke"
      />
    </ChartFrame>
  );
}

function Part({ part, height }: { part: BarPart; height: number }) {
  if (part.kind === "drive") {
    return (
      <line
        x1={part.x}
        x2={part.x + part.width}
        y1={height / 2}
        y2={height / 2}
        className={part.over ? "stroke-brick-line" : "stroke-soft"}
        strokeWidth="1.5"
        vectorEffect="non-scaling-stroke"
      />
    );
  }
  return (
    <rect
      x={part.x}
      y="4"
      width={part.width}
      height={height - 8}
      className={part.over ? "fill-brick" : "fill-spruce"}
    />
  );
}

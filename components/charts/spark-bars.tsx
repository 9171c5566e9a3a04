import { ChartFrame } from "@/components/charts/frame";
import type { SparkBarsModel } from "@/lib/present/spark-bars";

/** A small row of bars, for a cell or beside a figure. */
export function SparkBars({ model, decorative }: { model: SparkBarsModel; decorative?: boolean }) {
  return (
    <ChartFrame
      title={model.title}
      description={model.description}
      viewBox={`0 0 ${model.width} ${model.height}`}
      width={model.width}
      height={model.height}
      decorative={decorative}
      className="inline-block align-bottom"
    >
      {model.bars.map(({ strong, label, ...bar }) => (
        <rect key={label} {...bar} className={strong ? "fill-spruce" : "fill-spruce opacity-30"} />
      ))}
      <line
        x2={model.width}
        y1={model.height - 0.5}
        y2={model.height - 0.5}
        className="stroke-ink"
      />
    </ChartFrame>
  );
}

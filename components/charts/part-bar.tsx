import { ChartFrame } from "@/components/charts/frame";
import type { ComparedBar } from "@/lib/present/policy-comparison";

const WIDTH = 1000;
const HEIGHT = 24;

/** One bar of parts from a common zero; as wide as its place. The words stand beside it. */
export function PartBar({
  bar,
  classOf,
}: {
  bar: ComparedBar;
  /** Fill of a part, by its key. */
  classOf: (key: string) => string;
}) {
  const zero = bar.zero * WIDTH;
  return (
    <ChartFrame
      title={`${bar.name}: ${bar.value}`}
      description={bar.parts.map((part) => part.label).join(", ")}
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      stretch
      className="block h-6 w-full"
    >
      {bar.parts
        .filter((part) => part.width > 0)
        .map((part) => (
          <rect
            key={part.key}
            x={part.from * WIDTH}
            width={part.width * WIDTH}
            y="2"
            height={HEIGHT - 4}
            vectorEffect="non-scaling-stroke"
            className={`stroke-sheet ${classOf(part.key)}`}
          >
            <title>{part.label}</title>
          </rect>
        ))}
      <line
        x1={zero}
        x2={zero}
        y2={HEIGHT}
        vectorEffect="non-scaling-stroke"
        className="stroke-ink"
      />
    </ChartFrame>
  );
}

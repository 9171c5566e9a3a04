export interface SparkBarsInput {
  /** What is counted: "Swaps a month". */
  title: string;
  /** In order; the label is the finished words: "Nov 2026: 41 swaps". */
  values: readonly { readonly value: number; readonly label: string }[];
  /** Drawn in full ink; the others are pale. -1 for the last (the default), null for all. */
  emphasis?: number | null;
}

export interface SparkBarsModel {
  readonly title: string;
  readonly description: string;
  readonly width: number;
  readonly height: number;
  readonly bars: readonly {
    readonly x: number;
    readonly y: number;
    readonly width: number;
    readonly height: number;
    readonly strong: boolean;
    readonly label: string;
  }[];
}

const PITCH = 8;
const BAR = 6;
const HEIGHT = 28;

/** A small row of bars from a common zero. Values must not be negative. */
export function sparkBars({ title, values, emphasis = -1 }: SparkBarsInput): SparkBarsModel {
  const most = Math.max(...values.map((entry) => entry.value), 0);
  const strong = emphasis !== null && emphasis < 0 ? values.length + emphasis : emphasis;
  return {
    title,
    description: values.map((entry) => entry.label).join("; "),
    width: Math.max(PITCH, values.length * PITCH),
    height: HEIGHT,
    bars: values.map(({ value, label }, i) => {
      // A small value is still a value: never thinner than half a pixel.
      const height = value === 0 ? 0 : Math.max(0.5, (value / most) * (HEIGHT - 2));
      const isStrong = strong === null || i === strong;
      return { x: i * PITCH, y: HEIGHT - 1 - height, width: BAR, height, strong: isStrong, label };
    }),
  };
}

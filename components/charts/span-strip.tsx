import { ChartFrame } from "@/components/charts/frame";
import { toneStroke, toneTint } from "@/components/charts/tone-class";
import type { Pennant, SpanStripModel } from "@/lib/present/span-strip";

/** One pack on a shared time axis; strips stack under one StripHead of the same axis. */
export function SpanStrip({ model, decorative }: { model: SpanStripModel; decorative?: boolean }) {
  const { width, height, mid, past, ahead, endX, spindle } = model;
  const stroke = toneStroke[model.tone];
  return (
    <ChartFrame
      title={model.title}
      description={model.description}
      viewBox={`0 0 ${width} ${height}`}
      width={width}
      height={height}
      decorative={decorative}
      className="block"
    >
      <path d={model.gridX.map((x) => `M${x} 0V${height}`).join("")} className="stroke-hair" />
      {past && <line {...past} y1={mid} y2={mid} className={stroke} strokeWidth="3" />}
      {ahead && <line {...ahead} y1={mid} y2={mid} className={stroke} strokeWidth="1.5" />}
      {spindle && (
        <>
          <path
            d={spindle.path}
            className={`${toneTint[model.tone]} ${stroke}`}
            strokeWidth="1.2"
          />
          <line
            x1={spindle.medianX}
            x2={spindle.medianX}
            y1={spindle.top}
            y2={spindle.bottom}
            className={stroke}
            strokeWidth="2"
          />
        </>
      )}
      {endX !== null && (
        <path
          d={`M${endX - 4} ${mid - 4}l8 8m0-8l-8 8`}
          className={stroke}
          strokeWidth="2"
          strokeLinecap="round"
        />
      )}
      <Dots model={model} />
      <line
        x1={model.nowX}
        x2={model.nowX}
        y2={height}
        className="stroke-ink"
        strokeWidth="1.2"
        strokeDasharray="2 2"
      />
      {model.pennants.map((pennant) => (
        <PennantMark key={`${pennant.x}-${pennant.published}`} pennant={pennant} />
      ))}
      <Beyond model={model} />
    </ChartFrame>
  );
}

function Dots({ model }: { model: SpanStripModel }) {
  return model.dots.map((x, i) => (
    <circle
      key={i}
      cx={x}
      cy={model.mid}
      r="3.4"
      className="fill-sheet stroke-ink"
      strokeWidth="1.4"
    />
  ));
}

function PennantMark({ pennant }: { pennant: Pennant }) {
  return (
    <path
      d={pennant.path}
      className={`stroke-dusk-line ${pennant.published ? "fill-dusk" : "fill-sheet"}`}
      strokeWidth="1.5"
    />
  );
}

/** An arrowhead at the edge where the likely cut-off lies outside the axis. */
function Beyond({ model }: { model: SpanStripModel }) {
  if (model.beyond === null) return null;
  const { width, mid } = model;
  const d =
    model.beyond === "after" ? `M${width - 8} ${mid - 5}l6 5l-6 5` : `M8 ${mid - 5}l-6 5l6 5`;
  return <path d={d} className={`fill-none ${toneStroke[model.tone]}`} strokeWidth="2" />;
}

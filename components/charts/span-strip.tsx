import { ChartFrame } from "@/components/charts/frame";
import { toneStroke, toneTint } from "@/components/charts/tone-class";
import {
  pennantPath,
  SPINDLE_BOTTOM,
  SPINDLE_TOP,
  type SpanStripModel,
  spindlePath,
  STRIP_HEIGHT,
  STRIP_MID,
  type StripScale,
} from "@/lib/present/span-strip";

export interface SpanStripProps {
  scale: StripScale;
  model: SpanStripModel;
  decorative?: boolean;
  /** A `StripGround` of the same scale on the page, drawn again in place of one of its own. */
  groundId?: string;
}

/** One pack on a shared time axis; strips stack under one StripHead of the same axis. */
export function SpanStrip({ scale, model, decorative, groundId }: SpanStripProps) {
  const { past, ahead, endX, spindle } = model;
  const { width } = scale;
  const mid = STRIP_MID;
  const stroke = toneStroke[model.tone];
  return (
    <ChartFrame
      title={model.title}
      description={model.description}
      viewBox={`0 0 ${width} ${STRIP_HEIGHT}`}
      width={width}
      height={STRIP_HEIGHT}
      decorative={decorative}
      className="block"
    >
      {groundId ? <use href={`#${groundId}`} /> : <Ground scale={scale} />}
      {past && <line {...past} y1={mid} y2={mid} className={stroke} strokeWidth="3" />}
      {ahead && <line {...ahead} y1={mid} y2={mid} className={stroke} strokeWidth="1.5" />}
      {spindle && (
        <>
          <path
            d={spindlePath(spindle)}
            className={`${toneTint[model.tone]} ${stroke}`}
            strokeWidth="1.2"
          />
          <line
            x1={spindle.medianX}
            x2={spindle.medianX}
            y1={SPINDLE_TOP}
            y2={SPINDLE_BOTTOM}
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
      {model.pennants.map(({ x, published }) => (
        <path
          key={`${x}-${published}`}
          d={pennantPath(x, width)}
          className={`stroke-dusk-line ${published ? "fill-dusk" : "fill-sheet"}`}
          strokeWidth="1.5"
        />
      ))}
      <Beyond model={model} width={width} />
    </ChartFrame>
  );
}

/** The ground of a stack of strips, to be named by their `groundId`; takes no room itself. */
export function StripGround({ id, scale }: { id: string; scale: StripScale }) {
  return (
    <svg className="absolute size-0" aria-hidden>
      <g id={id}>
        <Ground scale={scale} />
      </g>
    </svg>
  );
}

/** The ticks of the axis, and today. */
function Ground({ scale: { gridX, nowX } }: { scale: StripScale }) {
  return (
    <>
      <path d={gridX.map((x) => `M${x} 0V${STRIP_HEIGHT}`).join("")} className="stroke-hair" />
      <line
        x1={nowX}
        x2={nowX}
        y2={STRIP_HEIGHT}
        className="stroke-ink"
        strokeWidth="1.2"
        strokeDasharray="2 2"
      />
    </>
  );
}

function Dots({ model }: { model: SpanStripModel }) {
  return model.dots.map((x, i) => (
    <circle
      key={i}
      cx={x}
      cy={STRIP_MID}
      r="3.4"
      className="fill-sheet stroke-ink"
      strokeWidth="1.4"
    />
  ));
}

/** An arrowhead at the edge where the likely cut-off lies outside the axis. */
function Beyond({ model, width }: { model: SpanStripModel; width: number }) {
  if (model.beyond === null) return null;
  const mid = STRIP_MID;
  const d =
    model.beyond === "after" ? `M${width - 8} ${mid - 5}l6 5l-6 5` : `M8 ${mid - 5}l-6 5l6 5`;
  return <path d={d} className={`fill-none ${toneStroke[model.tone]}`} strokeWidth="2" />;
}

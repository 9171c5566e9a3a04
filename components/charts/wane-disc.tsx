import { ChartFrame } from "@/components/charts/frame";
import { toneFill, toneStroke } from "@/components/charts/tone-class";
import { DISC_RADIUS, type WaneDiscModel } from "@/lib/present/wane-disc";

const STROKE = 1.5;
const RING = DISC_RADIUS + STROKE / 2;
const EDGE = DISC_RADIUS + STROKE + 0.5;

export interface WaneDiscProps {
  model: WaneDiscModel;
  /** Diameter in px. */
  size?: number;
  decorative?: boolean;
}

/** The share of charge left as a waning disc. Always beside a number or a word. */
export function WaneDisc({ model, size = 20, decorative }: WaneDiscProps) {
  const stroke = toneStroke[model.tone];
  return (
    <ChartFrame
      title={model.title}
      viewBox={`${-EDGE} ${-EDGE} ${2 * EDGE} ${2 * EDGE}`}
      width={size}
      height={size}
      decorative={decorative}
      className="inline-block align-middle"
    >
      {/* The ring lies outside the lit part, so that it hides none of a thin crescent. */}
      <circle
        r={RING}
        className={`fill-sheet ${stroke}`}
        strokeWidth={STROKE}
        strokeDasharray={model.state === "unknown" ? "3 3" : undefined}
      />
      {model.litPath && <path d={model.litPath} className={toneFill[model.tone]} />}
      {model.state === "out" && (
        <path d="M-5-5L5 5M5-5L-5 5" className={stroke} strokeWidth="2" strokeLinecap="round" />
      )}
    </ChartFrame>
  );
}

/** The disc with its word: how it stands in tables and lists. */
export function WaneLabel({ model, size = 20 }: Omit<WaneDiscProps, "decorative">) {
  return (
    <span className="inline-flex items-center gap-2 align-middle whitespace-nowrap">
      <WaneDisc model={model} size={size} decorative />
      {model.label}
    </span>
  );
}

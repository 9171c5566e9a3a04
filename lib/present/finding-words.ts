import { formatDay } from "./format-day";
import { formatPercent } from "./format-share";
import { formatNumber } from "./locale";

export interface FindingInput {
  readonly kind: "bad-lot" | "draw-shift";
  readonly lotCode: string | null;
  readonly modelName: string | null;
  readonly since: string | null;
  /** Life against other lots', or draw after against before. */
  readonly factor: number;
}

export interface FindingWords {
  /** "Weak lot LR6-010". */
  readonly title: string;
  /** What was seen, in one sentence. */
  readonly evidence: string;
  readonly todo: readonly string[];
}

/** A finding in plain words: what it is, what was seen, what to do. */
export function findingWords(finding: FindingInput, locale: string): FindingWords {
  return finding.kind === "bad-lot" ? badLot(finding, locale) : drawShift(finding, locale);
}

function badLot({ lotCode, factor }: FindingInput, locale: string): FindingWords {
  const shorter = formatPercent(Math.max(0, 1 - factor), locale);
  return {
    title: `Weak lot ${lotCode}`,
    evidence: `Packs of this lot lived ${shorter} shorter than other packs of the same cells in like devices.`,
    todo: [
      "Keep what is left of it in stores and vans out of new packs.",
      "Take a voltage of its packs at the next visit to their sites; their dates are less sure than others.",
      "Tell the supplier the date code, and ask about others of the same day.",
    ],
  };
}

function drawShift({ modelName, factor, since }: FindingInput, locale: string): FindingWords {
  const change = formatPercent(Math.min(1, Math.abs(factor - 1)), locale);
  const times = factor > 2 ? `${formatNumber(factor, locale, 1)} times as much` : `${change} more`;
  const how = factor >= 1 ? times : `${change} less`;
  return {
    title: `${modelName} draws ${how}`,
    evidence: `Voltages fall as if the draw had changed around ${since ? formatDay(since, locale) : "an unknown day"}; a change of firmware or settings a little before is the usual cause.`,
    todo: [
      "Ask what changed on these devices in the months before.",
      "Measure the draw of one or two of them and record it; their forecasts follow at once.",
      "If it is to stay, correct the duty cycle of the device model; if not, have it undone.",
    ],
  };
}

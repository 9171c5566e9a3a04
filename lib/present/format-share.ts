import { EN_DASH, formatNumber, NBSP } from "./locale";

/**
 * A share from 0 to 1 in percent. What is neither none nor all never reads as 0 % or 100 %:
 * 0.4 % is "< 1 %", 99.8 % is "> 99 %".
 */
export function formatPercent(share: number, locale: string): string {
  if (!(share >= 0 && share <= 1)) throw new RangeError(`not a share from 0 to 1: ${share}`);
  const percent = share * 100;
  if (percent > 0 && percent < 0.995) return `<${NBSP}1${NBSP}%`;
  if (percent < 100 && percent >= 99.5) return `>${NBSP}99${NBSP}%`;
  return `${formatNumber(percent, locale)}${NBSP}%`;
}

export interface ShareState {
  /** Share of charge left, 0 to 1; null when nothing is known. */
  share: number | null;
  /** The device is known to have stopped. */
  isOut: boolean;
}

/** Charge left in words: "out", "< 1 %", "9 %", "not known". In service it is never "0 %". */
export function shareLabel({ share, isOut }: ShareState, locale: string): string {
  if (isOut) return "out";
  if (share === null) return "not known";
  return share === 0 ? `<${NBSP}1${NBSP}%` : formatPercent(share, locale);
}

/** Charge left as a sentence for reading out: "9 % of charge left", "out". */
export function shareSentence(state: ShareState, locale: string): string {
  const label = shareLabel(state, locale);
  return state.isOut || state.share === null ? `charge left: ${label}` : `${label} of charge left`;
}

/** A range of shares: "6–13 %". */
export function formatPercentRange(low: number, high: number, locale: string): string {
  const [a, b] = [low, high].map((share) => formatNumber(share * 100, locale));
  if (a === b) return formatPercent(low, locale);
  return `${a}${EN_DASH}${b}${NBSP}%`;
}

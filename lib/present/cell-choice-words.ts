import type { CellOption } from "@/lib/planning/cell-choice";
import type { CandidateCell, Misfit } from "@/lib/planning/cell-fit";
import { formatCurrent, formatTemperature, formatVolts } from "./format-quantity";
import { formatPercent } from "./format-share";
import { EN_DASH, formatNumber, NBSP } from "./locale";

const DAYS_PER_YEAR = 365.2425;
/** Below this a life reads better in months. */
const MONTHS_BELOW_DAYS = 730;

/** A life in the unit it is thought of: "9 months", "4.2 years". */
function life(days: number, locale: string): string {
  if (days < 60) return `${formatNumber(days, locale)}${NBSP}days`;
  if (days < MONTHS_BELOW_DAYS) {
    return `${formatNumber(days / (DAYS_PER_YEAR / 12), locale)}${NBSP}months`;
  }
  return `${formatNumber(days / DAYS_PER_YEAR, locale, 1)}${NBSP}years`;
}

export interface LifeWords {
  readonly likely: string;
  /** "8–14 months". */
  readonly range: string;
}

/** How long a fresh pack lasts, with its range. */
export function lifeWords(
  { lifeDays, beyond }: Pick<CellOption, "lifeDays" | "beyond">,
  locale: string,
): LifeWords {
  const { p05, p50, p95 } = lifeDays;
  const text = life(p50, locale);
  const [from, to] = [life(p05, locale), life(p95, locale)];
  const [number = "", unit] = from.split(NBSP);
  const range = to.endsWith(unit ?? " ") ? `${number}${EN_DASH}${to}` : `${from} ${EN_DASH} ${to}`;
  return { likely: beyond ? `over ${text}` : text, range };
}

/** What a holder says about a cell that fits electrically. */
export function holderWords(option: CellOption, all: readonly CellOption[]): string {
  const { cell, fit } = option;
  if (cell.accepted) return cell.preferred ? "listed, preferred" : "listed for this model";
  if (fit.holder === "held") {
    return `same size (${cell.size}) as a listed cell; ask the maker, then list it`;
  }
  if (fit.holder === "larger")
    return `${largerWords(option, all)}; the holder must fit ${cell.size}`;
  return `the holder must fit${cell.size ? ` ${cell.size}` : ""}: not the size of a listed cell`;
}

/** A larger size of the same voltage is no better a cell: it works the same, only longer. */
function largerWords({ cell, lifeDays }: CellOption, all: readonly CellOption[]): string {
  const listed = all.find(
    (other) => other.cell.accepted && other.cell.spec.chemistry === cell.spec.chemistry,
  );
  const times = listed && lifeDays.p50 / listed.lifeDays.p50;
  const than =
    listed && times && times > 1.05
      ? `, ${times.toFixed(1)} times as long as ${listed.cell.designation}`
      : "";
  return `works the same, only longer${than}`;
}

/** Why a cell does not fit, one clause a reason. */
export function misfitWords(misfit: Misfit, locale: string): string {
  switch (misfit.kind) {
    case "too-high":
      return `fresh, the pack rests at ${formatVolts(misfit.freshMv, locale)}; listed cells go with up to ${formatVolts(misfit.limitMv, locale)}`;
    case "too-low":
      return `even fresh it falls to ${formatVolts(misfit.loadedMv, locale)} under the peak current, and the device stops at ${formatVolts(misfit.cutoffMv, locale)}`;
    case "little-used":
      return `the device stops at ${formatVolts(misfit.cutoffMv, locale)} with ${formatPercent(1 - misfit.usedShare, locale)} of the charge still in the cells`;
    case "pulse":
      return pulseWords(misfit, locale);
    case "cold":
      return `nights at the site fall to ${formatTemperature(misfit.coldestDc, locale)}; cells of this chemistry work down to ${formatTemperature(misfit.limitDc, locale)}`;
  }
}

function pulseWords(misfit: Extract<Misfit, { kind: "pulse" }>, locale: string): string {
  const { peakUa, limitUa, capacitorUf } = misfit;
  const millifarads = capacitorUf / 1000;
  const helps =
    millifarads <= 1000
      ? `; a capacitor of about ${formatNumber(Math.max(0.1, millifarads), locale, millifarads < 10 ? 1 : 0)}${NBSP}mF could carry it`
      : "";
  return `the peak of ${formatCurrent(peakUa, locale)} is above its ${formatCurrent(limitUa, locale)} pulse limit${helps}`;
}

/** Voltage and charge in the coldest night, in words. */
export function coldWords({ cold }: Pick<CellOption, "cold">, locale: string): string {
  const volts = `${formatVolts(cold.freshMv, locale)} fresh, ${formatVolts(cold.halfUsedMv, locale)} half used`;
  const share = `${formatPercent(cold.share, locale)} of its charge`;
  return cold.stopsHalfUsed ? `${volts}: stops half used; ${share}` : `${volts}; ${share}`;
}

/** Mass of a whole pack: "69 g", "1.2 kg". */
export function massWords(massMg: number | null, locale: string): string {
  if (massMg === null) return "—";
  const grams = massMg / 1000;
  return grams < 1000
    ? `${formatNumber(grams, locale, grams < 10 ? 1 : 0)}${NBSP}g`
    : `${formatNumber(grams / 1000, locale, 1)}${NBSP}kg`;
}

/** General cautions by chemistry (IEC 60086-4 and -5, from memory); local rules come first. */
const CAUTIONS: Readonly<Record<string, string>> = {
  alkaline:
    "Leaks when left in exhausted: take spent cells out. Never mix with old or other cells.",
  "zinc-carbon": "Leaks when spent and weakens in the cold: swap in good time.",
  "li-fes2": "Lithium: transport rules for UN 3090 apply; insulate the ends; never charge or heat.",
  "li-socl2":
    "Lithium, toxic when burst: UN 3090; never short, charge, heat or open. After long rest the first load may find a low voltage that passes.",
  "li-mno2": "Lithium: transport rules for UN 3090 apply; insulate the ends; never charge or heat.",
  "silver-oxide": "Button cell: dangerous when swallowed; keep count of what comes out.",
  vrla: "Heavy and never dead: cover the terminals; gas forms when charged; acid if it cracks.",
  lifepo4: "Rechargeable lithium: UN 3480; charge only above 0 °C and with its own charger.",
};

export function cellCaution(cell: CandidateCell): string {
  return CAUTIONS[cell.spec.chemistry] ?? "";
}

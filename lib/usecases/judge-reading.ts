import { CURVES } from "@/lib/battery/curve-tables";
import type { Chemistry } from "@/lib/battery/pack";

/** What a voltage is judged against. */
export interface JudgedPack {
  readonly chemistry: Chemistry;
  /** Of one cell; a 12 V block is one cell of six elements. */
  readonly nominalMv: number;
  readonly series: number;
  /** Of the whole pack. */
  readonly cutoffMv: number;
  /** The resting voltage logged last before this one, if any. */
  readonly previousRestingMv: number | null;
}

export interface JudgedReading {
  readonly millivolts: number;
  readonly kind: "resting" | "loaded";
  readonly temperatureDc: number | null;
}

export interface Judgement {
  /** Why the value cannot be; null when it can. */
  readonly refusal: string | null;
  /** Why the value is unlikely, to be kept beside it; null when it is not. */
  readonly doubt: string | null;
}

/** A voltage this far above a fresh pack's is a slip of the meter's range or of the pen. */
const IMPOSSIBLE_RATIO = 1.25;
/** A fresh pack's open-circuit voltage varies by a few hundredths between makers. */
const UNLIKELY_RATIO = 1.04;
/** Below this share of the cut-off a device cannot have run: a broken contact is likelier. */
const TOO_LOW_RATIO = 0.6;
/** A rest of some hours lifts a cell by tens of millivolts; more than this is no recovery. */
const RISE_MV_PER_ELEMENT = 80;
const RECHARGEABLE: readonly Chemistry[] = ["vrla", "lifepo4"];

/**
 * Resting voltage of a fresh pack at 20 °C, mV.
 * Source: the curve tables of lib/battery, read at no discharge, times elements in series.
 */
export function freshPackMv(pack: Pick<JudgedPack, "chemistry" | "nominalMv" | "series">): number {
  const curve = CURVES[pack.chemistry];
  return Math.max(curve.restMv[0] ?? 0, curve.elementMv) * elementsInSeries(pack);
}

function elementsInSeries(pack: Pick<JudgedPack, "chemistry" | "nominalMv" | "series">): number {
  const perCell = Math.round(pack.nominalMv / CURVES[pack.chemistry].elementMv);
  return Math.max(1, perCell) * pack.series;
}

/** Tells the impossible (refused) from the unlikely (kept, marked) and the ordinary. */
export function judgeReading(pack: JudgedPack, reading: JudgedReading): Judgement {
  const fresh = freshPackMv(pack);
  const limit = Math.round(fresh * IMPOSSIBLE_RATIO);
  if (reading.millivolts < 0) {
    return { refusal: "A pack's voltage is not below 0 V: are the leads crossed?", doubt: null };
  }
  if (reading.millivolts > limit) {
    const refusal = `${volts(reading.millivolts)} is more than this pack can show: fresh it rests near ${volts(fresh)}, and above ${volts(limit)} the entry or the meter's range is wrong.`;
    return { refusal, doubt: null };
  }
  return { refusal: null, doubt: doubtOf(pack, reading, fresh) };
}

function doubtOf(pack: JudgedPack, reading: JudgedReading, fresh: number): string | null {
  const { millivolts } = reading;
  if (millivolts > fresh * UNLIKELY_RATIO) return `above a fresh pack's ${volts(fresh)}`;
  if (millivolts < pack.cutoffMv * TOO_LOW_RATIO) {
    return `far below the cut-off of ${volts(pack.cutoffMv)}: a poor contact?`;
  }
  const rise = reading.kind === "resting" ? riseOf(pack, millivolts) : null;
  if (rise) return rise;
  const { temperatureDc } = reading;
  if (temperatureDc !== null && (temperatureDc < -400 || temperatureDc > 700)) {
    return "a temperature outside −40 to 70 °C";
  }
  return null;
}

function riseOf(pack: JudgedPack, millivolts: number): string | null {
  const before = pack.previousRestingMv;
  if (before === null || RECHARGEABLE.includes(pack.chemistry)) return null;
  return millivolts - before > RISE_MV_PER_ELEMENT * elementsInSeries(pack)
    ? `above the ${volts(before)} logged before: a primary pack does not gain charge`
    : null;
}

/** "3.48 V": reasons are kept as written, so they have one decimal sign everywhere. */
function volts(millivolts: number): string {
  return `${(millivolts / 1000).toFixed(2)} V`;
}

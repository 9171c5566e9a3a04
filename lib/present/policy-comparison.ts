import { formatMoney } from "./format-quantity";
import { formatPercent } from "./format-share";
import { formatNumber, NBSP } from "./locale";
import type { PolicyCause, PolicyName, PolicyOutcome, PolicyRecord } from "./policy-record";

/** The simulated district pays in pounds, whatever the organisation counts in. */
const CURRENCY = "GBP";

export const POLICY_WORDS: Record<PolicyName, string> = {
  "fixed-interval": "Fixed interval",
  "inspection-threshold": "Below a voltage",
  "run-to-failure": "Run to failure",
  wanewright: "Wanewright",
};

/** In the order in which bars stack: at the site, on the road, too late, left over. */
export const CAUSE_WORDS: Record<PolicyCause, string> = {
  cells: "cells",
  work: "work at the site",
  looking: "looking without swapping",
  crewOnTheRoad: "crew on the road",
  kilometres: "kilometres",
  urgentTrips: "urgent trips",
  silence: "silence",
  wornStock: "charge used up beyond what was put in",
};
export const CAUSES = Object.keys(CAUSE_WORDS) as PolicyCause[];

export interface BarPart {
  /** A cause, or a policy where the bar has one part. */
  readonly key: string;
  /** Share of the longest bar's width, 0 to 1, and where it starts. */
  readonly from: number;
  readonly width: number;
  /** "cells £12.60" */
  readonly label: string;
}

export interface ComparedBar {
  readonly policy: PolicyName;
  readonly name: string;
  /** The finished number at the bar's end. */
  readonly value: string;
  readonly parts: readonly BarPart[];
  /** Where zero lies, 0 to 1: what is paid back lies to its left. */
  readonly zero: number;
}

export interface ComparedMeasure {
  readonly title: string;
  readonly bars: readonly ComparedBar[];
}

export interface PolicyComparison {
  readonly costs: ComparedMeasure;
  readonly measures: readonly ComparedMeasure[];
  /** Share by which the product's cost lies below the cheapest of the others; negative: above. */
  readonly saving: number;
  readonly cheapestOther: PolicyOutcome;
  readonly own: PolicyOutcome;
}

/** Money of the comparison: "£39.35". */
export function pounds(amount: number, locale: string): string {
  return formatMoney(Math.round(amount * 100), { locale, currency: CURRENCY });
}

/**
 * The policies of a record side by side, as bars of one scale a measure.
 * @throws Error when the record lacks the product's row or any other
 */
export function policyComparison(record: PolicyRecord, locale: string): PolicyComparison {
  const own = record.means.find((mean) => mean.policy === "wanewright");
  const others = record.means.filter((mean) => mean.policy !== "wanewright");
  const [cheapestOther] = [...others].sort((a, b) => a.pounds - b.pounds);
  if (!own || !cheapestOther) throw new Error("the policy record lacks a policy");
  const number = (digits: number, unit: string) => (value: number) =>
    `${formatNumber(value, locale, digits)}${unit === "" ? "" : NBSP + unit}`;
  const measure = (title: string, of: (o: PolicyOutcome) => number, say: (v: number) => string) =>
    singleBars(record.means, { title, of, say });
  return {
    costs: costBars(record.means, locale),
    measures: [
      measure("Hours without data", (o) => o.deadHours, number(1, "h")),
      measure("Visits", (o) => o.visits, number(2, "")),
      measure("Driven", (o) => o.kilometres, number(1, "km")),
      measure(
        "Charge thrown away",
        (o) => o.wastedShare,
        (v) => formatPercent(v, locale),
      ),
    ],
    saving: 1 - own.pounds / cheapestOther.pounds,
    cheapestOther,
    own,
  };
}

function costBars(means: readonly PolicyOutcome[], locale: string): ComparedMeasure {
  const paid = (mean: PolicyOutcome) => sum(CAUSES.map((c) => Math.max(0, mean.poundsByCause[c])));
  const back = (mean: PolicyOutcome) => sum(CAUSES.map((c) => Math.max(0, -mean.poundsByCause[c])));
  const left = Math.max(...means.map(back));
  const scale = left + Math.max(...means.map(paid), Number.MIN_VALUE);
  const bars = means.map((mean): ComparedBar => {
    let [up, down] = [left, left];
    const parts = CAUSES.map((cause): BarPart => {
      const amount = mean.poundsByCause[cause];
      const width = Math.abs(amount) / scale;
      if (amount < 0) down += amount;
      const from = (amount < 0 ? down : up) / scale;
      if (amount > 0) up += amount;
      return { key: cause, from, width, label: `${CAUSE_WORDS[cause]} ${pounds(amount, locale)}` };
    });
    const name = POLICY_WORDS[mean.policy];
    const value = pounds(mean.pounds, locale);
    return { policy: mean.policy, name, value, parts, zero: left / scale };
  });
  return { title: "Cost of a device-year, by cause", bars };
}

interface SingleMeasure {
  readonly title: string;
  readonly of: (outcome: PolicyOutcome) => number;
  readonly say: (value: number) => string;
}

function singleBars(
  means: readonly PolicyOutcome[],
  { title, of, say }: SingleMeasure,
): ComparedMeasure {
  const most = Math.max(...means.map(of), Number.MIN_VALUE);
  const bars = means.map((mean): ComparedBar => {
    const part = { key: mean.policy, from: 0, width: of(mean) / most, label: say(of(mean)) };
    const name = POLICY_WORDS[mean.policy];
    return { policy: mean.policy, name, value: say(of(mean)), parts: [part], zero: 0 };
  });
  return { title, bars };
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}

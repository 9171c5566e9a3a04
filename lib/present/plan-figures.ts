import { formatMoney } from "./format-quantity";
import { formatHours } from "./format-time";
import { formatNumber, type Presentation } from "./locale";

export interface PlanCostInput {
  readonly figures: {
    readonly crewMinor: number;
    readonly travelMinor: number;
    readonly cellsMinor: number;
    readonly riskMinor: number;
    readonly totalMinor: number;
    readonly expectedOut: number;
    readonly swaps: number;
    readonly sites: number;
    readonly rounds: number;
    readonly driveS: number;
    readonly workS: number;
    readonly dutyS: number;
    readonly overtimeS: number;
    readonly distanceM: number;
  };
  readonly habit: { readonly minor: number; readonly packs: number } | null;
}

export interface FigureWords {
  readonly label: string;
  readonly value: string;
  readonly range: string;
  readonly quiet?: boolean;
}

/** The figures above the board. */
export function planFigureWords(cost: PlanCostInput, presentation: Presentation): FigureWords[] {
  const { figures: f, habit } = cost;
  const { locale } = presentation;
  const money = (minor: number) => formatMoney(minor, presentation, { whole: true });
  const count = (n: number, one: string, many: string) =>
    `${formatNumber(n, locale)} ${n === 1 ? one : many}`;
  const words: FigureWords[] = [
    {
      label: "Swaps",
      value: formatNumber(f.swaps, locale),
      range: `at ${count(f.sites, "site", "sites")}, ${count(f.rounds, "round", "rounds")}`,
    },
    {
      label: "Expected cost of this plan",
      value: money(f.totalMinor),
      range: `${money(f.crewMinor + f.travelMinor)} crew and vans · ${money(f.cellsMinor)} cells · ${money(f.riskMinor)} risk`,
    },
    {
      label: "On duty",
      value: formatHours(f.dutyS, locale),
      range: `${formatHours(f.driveS, locale)} driving${f.overtimeS >= 180 ? ` · ${formatHours(f.overtimeS, locale)} overtime` : ""}`,
    },
    {
      label: "Out before its visit",
      value: formatNumber(f.expectedOut, locale, 1),
      range: f.expectedOut >= 0.95 && f.expectedOut < 1.05 ? "pack expected" : "packs expected",
    },
  ];
  if (habit) {
    words.splice(2, 0, {
      label: "If every pack went on its fixed interval",
      value: money(habit.minor),
      range: "in the long run, same days",
      quiet: true,
    });
  }
  return words;
}

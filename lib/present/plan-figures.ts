import { formatDistance, formatMoney } from "./format-quantity";
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

export interface ComparedFigure {
  readonly label: string;
  readonly values: readonly [string, string];
  /** The second less the first, with its sign; "same" where the written values agree. */
  readonly change: string;
  /** 1: the second plan is better in this; -1: worse; 0: neither. */
  readonly better: -1 | 0 | 1;
}

type Figures = PlanCostInput["figures"];

/** One line of the comparison. @param judged less of it is better; otherwise neither is */
function comparedFigure(
  label: string,
  [x, y]: readonly [number, number],
  write: (value: number) => string,
  judged: boolean,
): ComparedFigure {
  const values = [write(x), write(y)] as const;
  if (values[0] === values[1]) return { label, values, change: "same", better: 0 };
  const change = `${y > x ? "+" : "\u2212"}${write(Math.abs(y - x))}`;
  return { label, values, change, better: judged ? (y < x ? 1 : -1) : 0 };
}

/** The figures of two plans, line by line. Less is better, but for swaps and sites. */
export function comparedFigures(
  a: Figures,
  b: Figures,
  presentation: Presentation,
): ComparedFigure[] {
  const { locale } = presentation;
  const money = (minor: number) => formatMoney(minor, presentation, { whole: true });
  const count = (n: number) => formatNumber(n, locale);
  const hours = (seconds: number) => formatHours(seconds, locale);
  const line = (
    label: string,
    of: (figures: Figures) => number,
    write: (value: number) => string,
    judged = true,
  ) => comparedFigure(label, [of(a), of(b)], write, judged);
  return [
    line("Swaps", (f) => f.swaps, count, false),
    line("Sites", (f) => f.sites, count, false),
    line("Rounds", (f) => f.rounds, count),
    line("Expected cost", (f) => f.totalMinor, money),
    line("of it crew and vans", (f) => f.crewMinor + f.travelMinor, money),
    line("of it cells", (f) => f.cellsMinor, money),
    line("of it risk of silence", (f) => f.riskMinor, money),
    line("On duty", (f) => f.dutyS, hours),
    line("Driving", (f) => f.driveS, hours),
    line("Overtime", (f) => f.overtimeS, hours),
    line(
      "Distance",
      (f) => f.distanceM,
      (metres) => formatDistance(metres, locale),
    ),
    line(
      "Packs out before their visit",
      (f) => f.expectedOut,
      (n) => formatNumber(n, locale, 1),
    ),
  ];
}

/** The rows of the benchmark as people read them. */
import { CAUSES, type PolicyRow, type Result } from "./ledger";

/** Mean over the seeds of each policy, in the order in which the policies first come. */
export function means(results: readonly Result[]): Result[] {
  const names = [...new Set(results.map((r) => r.policy))];
  return names.map((policy) => {
    const own = results.filter((r) => r.policy === policy);
    const mean = (of: (r: Result) => number) => own.reduce((s, r) => s + of(r), 0) / own.length;
    const causes = CAUSES.map((cause) => [cause, mean((r) => r.byCause[cause])]);
    return {
      policy,
      seed: "mean",
      costPerDeviceYear: mean((r) => r.costPerDeviceYear),
      deadHoursPerDeviceYear: mean((r) => r.deadHoursPerDeviceYear),
      visitsPerDeviceYear: mean((r) => r.visitsPerDeviceYear),
      kmPerDeviceYear: mean((r) => r.kmPerDeviceYear),
      wastedAhShare: mean((r) => r.wastedAhShare),
      byCause: Object.fromEntries(causes) as Result["byCause"],
      swapsPerDeviceYear: mean((r) => r.swapsPerDeviceYear),
      stopsPerDeviceYear: mean((r) => r.stopsPerDeviceYear),
      urgentPerDeviceYear: mean((r) => r.urgentPerDeviceYear),
      readsPerDeviceYear: mean((r) => r.readsPerDeviceYear),
    };
  });
}

/** The six figures that are published of a result. */
export function rowOf(result: Result): PolicyRow {
  const { policy, seed, costPerDeviceYear, deadHoursPerDeviceYear } = result;
  const { visitsPerDeviceYear, kmPerDeviceYear, wastedAhShare } = result;
  return {
    policy,
    seed,
    costPerDeviceYear,
    deadHoursPerDeviceYear,
    visitsPerDeviceYear,
    kmPerDeviceYear,
    wastedAhShare,
  };
}

function row(cells: readonly string[]): string {
  return `| ${cells.join(" | ")} |`;
}

function head(names: readonly string[]): string[] {
  return [row(names), row(names.map(() => "---"))];
}

/** Costs, dead hours, visits, kilometres and wasted charge a device-year. */
export function mainTable(results: readonly Result[]): string {
  const names = [
    "policy",
    "seed",
    "cost £",
    "dead h",
    "visits",
    "km",
    "wasted Ah",
    "swaps",
    "stops",
  ];
  const lines = results.map((r) =>
    row([
      r.policy,
      r.seed,
      r.costPerDeviceYear.toFixed(2),
      r.deadHoursPerDeviceYear.toFixed(1),
      r.visitsPerDeviceYear.toFixed(2),
      r.kmPerDeviceYear.toFixed(1),
      `${(100 * r.wastedAhShare).toFixed(0)} %`,
      r.swapsPerDeviceYear.toFixed(2),
      r.stopsPerDeviceYear.toFixed(3),
    ]),
  );
  return [...head(names), ...lines].join("\n");
}

/** Pounds a device-year by cause. */
export function causeTable(results: readonly Result[]): string {
  const lines = results.map((r) =>
    row([r.policy, r.seed, ...CAUSES.map((cause) => (r.byCause[cause] / 100).toFixed(2))]),
  );
  return [...head(["policy", "seed", ...CAUSES]), ...lines].join("\n");
}

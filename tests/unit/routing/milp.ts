/**
 * The routing problem as a mixed-integer programme in CPLEX LP text, for HiGHS: the compact
 * two-index formulation of the vehicle routing problem with time windows (Desrochers, Lenstra,
 * Savelsbergh & Soumis 1988), one copy a slot, with optional visits. Problems without breaks.
 */
import type { Problem } from "../../../lib/routing/problem";

const BIG = 200_000;

interface Lines {
  readonly cost: string[];
  readonly rows: string[];
  readonly bounds: string[];
  readonly binaries: string[];
}

function allowed(problem: Problem, i: number, r: number): boolean {
  const site = problem.sites[i]!;
  const slot = problem.slots[r]!;
  if (site.lockedTo !== undefined && site.lockedTo !== r) return false;
  if (slot.day < site.firstDay || !site.windows[slot.day]) return false;
  return (site.skills & slot.skills) === site.skills;
}

function visitCost(problem: Problem, i: number, r: number): number {
  const site = problem.sites[i]!;
  const slot = problem.slots[r]!;
  let cost = site.visitCost[slot.day]!;
  if (site.previous) {
    const before = problem.slots[site.previous.slot]!;
    if (before.day !== slot.day) cost += site.previous.dayCost;
    if (before.technician !== slot.technician) cost += site.previous.technicianCost;
  }
  return cost;
}

function addSlot(problem: Problem, r: number, out: Lines): void {
  const slot = problem.slots[r]!;
  const { drivingPerS, dutyPerS, perM } = problem.prices;
  const here = problem.sites.map((_, i) => i).filter((i) => allowed(problem, i, r));
  const seconds = (a: number, b: number) => problem.travelS[a * problem.places + b]!;
  const legCost = (a: number, b: number) =>
    seconds(a, b) * drivingPerS + problem.travelM[a * problem.places + b]! * perM;
  const place = (i: number) => problem.sites[i]!.place;
  const arc = (from: string, to: string, cost: number) => {
    const name = `x_${r}_${from}_${to}`;
    out.binaries.push(name);
    out.cost.push(`${cost} ${name}`);
    return name;
  };
  const into = new Map(here.map((i) => [i, [] as string[]]));
  const outOf = new Map(here.map((i) => [i, [] as string[]]));
  const starts: string[] = [];
  const ends: string[] = [];
  for (const i of here) {
    const site = problem.sites[i]!;
    const window = site.windows[slot.day]!;
    out.bounds.push(`${window.openS} <= t_${r}_${i} <= ${window.closeS}`);
    const first = arc("s", `${i}`, legCost(slot.startPlace, place(i)) + slot.openingCost);
    const last = arc(`${i}`, "e", legCost(place(i), slot.endPlace));
    starts.push(first);
    ends.push(last);
    into.get(i)!.push(first);
    outOf.get(i)!.push(last);
    const departS = slot.startS + seconds(slot.startPlace, place(i));
    out.rows.push(`t_${r}_${i} - ${BIG} ${first} >= ${departS - BIG}`);
    const homeS = site.serviceS + seconds(place(i), slot.endPlace);
    out.rows.push(`e_${r} - t_${r}_${i} - ${BIG} ${last} >= ${homeS - BIG}`);
    for (const j of here) {
      if (i === j) continue;
      const name = arc(`${i}`, `${j}`, legCost(place(i), place(j)));
      outOf.get(i)!.push(name);
      into.get(j)!.push(name);
      const gapS = site.serviceS + seconds(place(i), place(j));
      out.rows.push(`t_${r}_${j} - t_${r}_${i} - ${BIG} ${name} >= ${gapS - BIG}`);
    }
  }
  for (const i of here) {
    out.binaries.push(`z_${r}_${i}`);
    out.cost.push(`${visitCost(problem, i, r)} z_${r}_${i}`);
    out.rows.push(`${into.get(i)!.join(" + ")} - z_${r}_${i} = 0`);
    out.rows.push(`${outOf.get(i)!.join(" + ")} - z_${r}_${i} = 0`);
  }
  if (here.length === 0) return;
  out.rows.push(`${starts.join(" + ")} <= 1`);
  out.rows.push(`${ends.join(" + ")} - ${starts.join(" - ")} = 0`);
  addVan(problem, r, here, out);
  const lastS = slot.endS + slot.overtimeS;
  out.bounds.push(`${slot.startS} <= e_${r} <= ${lastS}`, `0 <= o_${r} <= ${slot.overtimeS}`);
  out.rows.push(`o_${r} - e_${r} >= ${-slot.endS}`);
  out.rows.push(`d_${r} - e_${r} = ${-slot.startS}`);
  out.cost.push(`${dutyPerS} d_${r}`, `${slot.overtimePerS} o_${r}`);
}

function addVan(problem: Problem, r: number, here: readonly number[], out: Lines): void {
  const slot = problem.slots[r]!;
  const sum = (of: (i: number) => number) => here.map((i) => `${of(i)} z_${r}_${i}`).join(" + ");
  slot.capacity.forEach((most, type) =>
    out.rows.push(`${sum((i) => problem.sites[i]!.demand[type]!)} <= ${most}`),
  );
  const all = (i: number) => problem.sites[i]!.demand.reduce((a, b) => a + b, 0);
  out.rows.push(`${sum(all)} <= ${slot.capacityTotal}`);
}

/** Cells of each type that all slots up to a day may take. */
function addStock(problem: Problem, out: Lines): void {
  problem.stock?.forEach((byDay, type) =>
    byDay.forEach((most, day) => {
      const terms = problem.slots.flatMap((slot, r) =>
        slot.day > day
          ? []
          : problem.sites.flatMap((site, i) =>
              allowed(problem, i, r) ? [`${site.demand[type]} z_${r}_${i}`] : [],
            ),
      );
      if (terms.length > 0) out.rows.push(`${terms.join(" + ")} <= ${most}`);
    }),
  );
}

/** LP text; a missed must or locked site costs `missed` beside its drop cost. */
export function milpText(problem: Problem, missed: number): string {
  const out: Lines = { cost: [], rows: [], bounds: [], binaries: [] };
  problem.slots.forEach((_, r) => addSlot(problem, r, out));
  addStock(problem, out);
  problem.sites.forEach((site, i) => {
    const must = site.must || site.lockedTo !== undefined;
    const skip = (must ? missed : site.skipCost) + (site.previous?.dropCost ?? 0);
    out.binaries.push(`y_${i}`);
    out.cost.push(`${skip} y_${i}`);
    const visits = problem.slots.flatMap((_, r) => (allowed(problem, i, r) ? [`z_${r}_${i}`] : []));
    out.rows.push(`${[...visits, `y_${i}`].join(" + ")} = 1`);
  });
  const signed = (terms: readonly string[]) => terms.join(" + ").replaceAll("+ -", "- ");
  const numbered = out.rows.map((row, i) => ` c${i}: ${row}`);
  return [
    `Minimize\n obj: ${signed(out.cost)}`,
    `Subject To\n${numbered.join("\n")}`,
    `Bounds\n ${out.bounds.join("\n ")}`,
    `Binary\n ${out.binaries.join("\n ")}\nEnd`,
  ].join("\n");
}

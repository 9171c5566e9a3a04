/** Refuses a problem that is not whole, naming field and mend. */
import { invalid, type Fault } from "../errors";
import { LARGEST_INTEGER, type DayWindow, type Problem, type Site, type Slot } from "./problem";

type Report = (field: string, message: string) => void;

function wholeNumber(report: Report, field: string, value: number | undefined, from = 0): void {
  if (value === undefined || !Number.isInteger(value)) {
    report(field, `is ${String(value)}; give a whole number`);
  } else if (value < from || value > LARGEST_INTEGER) {
    report(field, `is ${value}; keep it between ${from} and ${LARGEST_INTEGER}`);
  }
}

function checkWindow(report: Report, field: string, window: DayWindow): void {
  wholeNumber(report, `${field}.openS`, window.openS);
  wholeNumber(report, `${field}.closeS`, window.closeS);
  if (window.closeS < window.openS) report(field, "closes before it opens; swap the two times");
}

function checkLength(report: Report, field: string, actual: number, expected: number): void {
  if (actual !== expected) report(field, `has ${actual} entries; give ${expected}`);
}

/** Reports the first entry that is wrong: a matrix has millions, and one mend is a start. */
function checkMatrix(
  report: Report,
  field: string,
  matrix: ArrayLike<number>,
  cells: number,
): void {
  checkLength(report, field, matrix.length, cells);
  for (let i = 0; i < matrix.length; i++) {
    const value = matrix[i]!;
    if (Number.isInteger(value) && value >= 0 && value <= LARGEST_INTEGER) continue;
    wholeNumber(report, `${field}[${i}]`, value);
    return;
  }
}

function checkIndex(report: Report, field: string, value: number, size: number): void {
  if (!Number.isInteger(value) || value < 0 || value >= size) {
    report(field, `is ${value}; give an index from 0 to ${size - 1}`);
  }
}

function checkSite(report: Report, problem: Problem, site: Site, field: string): void {
  checkIndex(report, `${field}.place`, site.place, problem.places);
  wholeNumber(report, `${field}.serviceS`, site.serviceS);
  wholeNumber(report, `${field}.skipCost`, site.skipCost);
  wholeNumber(report, `${field}.firstDay`, site.firstDay);
  checkLength(report, `${field}.windows`, site.windows.length, problem.days);
  checkLength(report, `${field}.visitCost`, site.visitCost.length, problem.days);
  checkLength(report, `${field}.demand`, site.demand.length, problem.cellTypes);
  site.windows.forEach((w, d) => w && checkWindow(report, `${field}.windows[${d}]`, w));
  site.visitCost.forEach((c, d) => wholeNumber(report, `${field}.visitCost[${d}]`, c));
  site.demand.forEach((q, t) => wholeNumber(report, `${field}.demand[${t}]`, q));
  if (site.lockedTo !== undefined) {
    checkIndex(report, `${field}.lockedTo`, site.lockedTo, problem.slots.length);
  }
  if (site.previous) {
    checkIndex(report, `${field}.previous.slot`, site.previous.slot, problem.slots.length);
    wholeNumber(report, `${field}.previous.dayCost`, site.previous.dayCost);
    wholeNumber(report, `${field}.previous.technicianCost`, site.previous.technicianCost);
    wholeNumber(report, `${field}.previous.dropCost`, site.previous.dropCost);
  }
}

function checkBreaks(report: Report, field: string, breaks: readonly DayWindow[]): void {
  breaks.forEach((pause, i) => {
    checkWindow(report, `${field}[${i}]`, pause);
    const before = breaks[i - 1];
    if (before && before.closeS > pause.openS) {
      report(`${field}[${i}]`, "starts before the break ahead of it ends; sort and separate them");
    }
  });
}

function checkSlot(report: Report, problem: Problem, slot: Slot, field: string): void {
  checkIndex(report, `${field}.day`, slot.day, problem.days);
  checkIndex(report, `${field}.startPlace`, slot.startPlace, problem.places);
  checkIndex(report, `${field}.endPlace`, slot.endPlace, problem.places);
  checkWindow(report, `${field} shift`, { openS: slot.startS, closeS: slot.endS });
  wholeNumber(report, `${field}.overtimeS`, slot.overtimeS);
  wholeNumber(report, `${field}.overtimePerS`, slot.overtimePerS);
  wholeNumber(report, `${field}.openingCost`, slot.openingCost);
  wholeNumber(report, `${field}.capacityTotal`, slot.capacityTotal);
  checkLength(report, `${field}.capacity`, slot.capacity.length, problem.cellTypes);
  slot.capacity.forEach((q, t) => wholeNumber(report, `${field}.capacity[${t}]`, q));
  checkBreaks(report, `${field}.breaks`, slot.breaks);
  slot.frozen.forEach((s, i) =>
    checkIndex(report, `${field}.frozen[${i}]`, s, problem.sites.length),
  );
}

function checkFrozenOnce(report: Report, problem: Problem): void {
  const seen = new Map<number, number>();
  problem.slots.forEach((slot, r) =>
    slot.frozen.forEach((site) => {
      const other = seen.get(site);
      if (other !== undefined) report(`slots[${r}].frozen`, `holds site ${site}, as slot ${other}`);
      const lockedTo = problem.sites[site]?.lockedTo;
      if (lockedTo !== undefined && lockedTo !== r) {
        report(`slots[${r}].frozen`, `holds site ${site}, which is locked to slot ${lockedTo}`);
      }
      seen.set(site, r);
    }),
  );
}

function checkStock(report: Report, { stock, cellTypes, days }: Problem): void {
  if (!stock) return;
  checkLength(report, "stock", stock.length, cellTypes);
  stock.forEach((byDay, type) => {
    checkLength(report, `stock[${type}]`, byDay.length, days);
    byDay.forEach((cells, day) => {
      wholeNumber(report, `stock[${type}][${day}]`, cells);
      if (cells < (byDay[day - 1] ?? 0)) {
        report(`stock[${type}][${day}]`, "is less than the day before; count deliveries up");
      }
    });
  });
}

/**
 * Refuses a problem that is not whole: wrong lengths, fractions, indices out of range.
 * @throws AppError "invalid" with one fault for each thing that is wrong (at most 50).
 */
export function assertProblem(problem: Problem): void {
  const faults: Fault[] = [];
  const report: Report = (field, message) => {
    if (faults.length < 50) faults.push({ field, message: `${field} ${message}.` });
  };
  wholeNumber(report, "days", problem.days);
  wholeNumber(report, "prices.drivingPerS", problem.prices.drivingPerS);
  wholeNumber(report, "prices.dutyPerS", problem.prices.dutyPerS);
  wholeNumber(report, "prices.perM", problem.prices.perM);
  const cells = problem.places * problem.places;
  checkMatrix(report, "travelS", problem.travelS, cells);
  checkMatrix(report, "travelM", problem.travelM, cells);
  problem.sites.forEach((site, i) => checkSite(report, problem, site, `sites[${i}]`));
  problem.slots.forEach((slot, r) => checkSlot(report, problem, slot, `slots[${r}]`));
  checkFrozenOnce(report, problem);
  checkStock(report, problem);
  if (faults.length > 0) throw invalid("The routing problem is not whole.", faults);
}

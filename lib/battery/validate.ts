/**
 * What a forecast can work with. Every fault names its field and how to mend it; numbers
 * that pass here give a forecast without NaN, however extreme they are.
 */
import { type Fault, invalid } from "../errors";
import { CHEMISTRIES, type CapacityPoint, type ForecastInput, type PackSpec } from "./pack";

const DAY_LIMIT = 100_000;

/** Faults of an input, empty when it can be forecast. */
export function forecastFaults(input: ForecastInput): readonly Fault[] {
  const faults: Fault[] = [];
  const need = (holds: boolean, field: string, message: string, row?: number): void => {
    if (!holds) faults.push(row === undefined ? { field, message } : { field, message, row });
  };
  checkCell(input.pack, need);
  checkPack(input.pack, need);
  checkHistory(input, need);
  return faults;
}

type Need = (holds: boolean, field: string, message: string, row?: number) => void;

const within = (x: number, low: number, high: number): boolean => x >= low && x <= high;
const isDay = (x: number): boolean => within(x, -DAY_LIMIT, DAY_LIMIT);

function checkPoint(point: CapacityPoint, field: string, need: Need, row?: number): void {
  need(within(point.currentUa, 0.001, 1e9), `${field}.currentUa`, "Give a current above 0.", row);
  need(within(point.cutoffMv, 0, 1e6), `${field}.cutoffMv`, "Give a cut-off of 0 or more.", row);
  need(
    within(point.temperatureDc, -2000, 2000),
    `${field}.temperatureDc`,
    "Give a temperature in tenths of a degree between -2000 and 2000.",
    row,
  );
  need(
    within(point.capacityMah, 0.001, 1e9),
    `${field}.capacityMah`,
    "Give a capacity above 0.",
    row,
  );
}

function checkCell({ cell }: PackSpec, need: Need): void {
  need(
    CHEMISTRIES.includes(cell.chemistry),
    "cell.chemistry",
    `Use one of: ${CHEMISTRIES.join(", ")}.`,
  );
  need(within(cell.nominalMv, 100, 1e5), "cell.nominalMv", "Give 100 to 100000 mV.");
  need(
    within(cell.selfDischargePpmPerYear, 0, 1e6),
    "cell.selfDischargePpmPerYear",
    "Give 0 to 1000000 parts per million a year.",
  );
  need(within(cell.resistanceMohm, 0, 1e8), "cell.resistanceMohm", "Give 0 or more milliohms.");
  checkPoint(cell.rated, "cell.rated", need);
  cell.capacityTable.forEach((p, i) => checkPoint(p, "cell.capacityTable", need, i + 1));
}

function checkPack(pack: PackSpec, need: Need): void {
  const count = (n: number): boolean => Number.isInteger(n) && within(n, 1, 1000);
  need(count(pack.series), "series", "Give a whole number from 1 to 1000.");
  need(count(pack.parallel), "parallel", "Give a whole number from 1 to 1000.");
  need(within(pack.cutoffMv, 0, 1e7), "cutoffMv", "Give a cut-off voltage of 0 mV or more.");
  need(isDay(pack.installedAt), "installedAt", "Give the day the pack was installed.");
  need(
    pack.madeAt === null || isDay(pack.madeAt),
    "madeAt",
    "Give the day the cells were made, or leave it empty.",
  );
  need(
    pack.monthlyMeanDc.length === 12 && pack.monthlyMeanDc.every((t) => within(t, -1000, 1000)),
    "monthlyMeanDc",
    "Give twelve monthly mean temperatures in tenths of a degree, January first.",
  );
  pack.duty.forEach((state, i) => {
    need(within(state.currentUa, 0, 1e9), "duty.currentUa", "Give a current of 0 or more.", i + 1);
    need(within(state.durationMs, 0, 1e12), "duty.durationMs", "Give a time of 0 or more.", i + 1);
  });
  const draw = pack.measuredDraw;
  need(
    !draw || within(draw.averageUa, 0, 1e9),
    "measuredDraw.averageUa",
    "Give a current of 0 or more.",
  );
  need(
    !draw || within(draw.relativeSd, 0, 10),
    "measuredDraw.relativeSd",
    "Give the relative spread as a share, 0 to 10.",
  );
}

function checkHistory(input: ForecastInput, need: Need): void {
  need(isDay(input.now), "now", "Give the day of the forecast.");
  input.readings.forEach((r, i) => {
    need(isDay(r.at), "readings.at", "Give the day of the reading.", i + 1);
    need(Number.isFinite(r.millivolts), "readings.millivolts", "Give the voltage in mV.", i + 1);
    need(
      r.loadUa === null || within(r.loadUa, 0, 1e9),
      "readings.loadUa",
      "Give a load of 0 or more, or leave it empty.",
      i + 1,
    );
    need(
      r.temperatureDc === null || within(r.temperatureDc, -1000, 1000),
      "readings.temperatureDc",
      "Give tenths of a degree between -1000 and 1000, or leave it empty.",
      i + 1,
    );
    need(
      r.accuracyMv === null || within(r.accuracyMv, 0, 1e6),
      "readings.accuracyMv",
      "Give the accuracy in mV, or leave it empty.",
      i + 1,
    );
  });
  input.temperatures?.forEach((t, i) => {
    need(isDay(t.at), "temperatures.at", "Give the day of the temperature.", i + 1);
    need(
      within(t.temperatureDc, -1000, 1000),
      "temperatures.temperatureDc",
      "Give tenths of a degree between -1000 and 1000.",
      i + 1,
    );
  });
  input.drawShifts?.forEach((s, i) => {
    need(isDay(s.at), "drawShifts.at", "Give the day of the shift.", i + 1);
    need(within(s.factor, 0.05, 20), "drawShifts.factor", "Give 0.05 to 20.", i + 1);
    need(within(s.relativeSd, 0, 2), "drawShifts.relativeSd", "Give 0 to 2.", i + 1);
  });
  checkEvents(input, need);
}

function checkEvents(input: ForecastInput, need: Need): void {
  input.events.forEach((e, i) => {
    need(isDay(e.at), "events.at", "Give the day of the event.", i + 1);
    const alive = e.lastAliveAt ?? e.at;
    need(
      isDay(alive) && alive <= e.at,
      "events.lastAliveAt",
      "Give a day before it stopped.",
      i + 1,
    );
  });
  const prior = input.prior;
  for (const key of ["capacityFactor", "drawFactor"] as const) {
    const factor = prior?.[key];
    need(!factor || within(factor.mean, 0.01, 100), `prior.${key}.mean`, "Give 0.01 to 100.");
    need(!factor || within(factor.relativeSd, 0, 10), `prior.${key}.relativeSd`, "Give 0 to 10.");
  }
}

/** Throw `invalid` with every fault unless the input can be forecast. */
export function assertForecastable(input: ForecastInput): void {
  const faults = forecastFaults(input);
  if (faults.length > 0) throw invalid("The pack or its readings cannot be used.", faults);
}

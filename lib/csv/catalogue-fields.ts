import {
  CAPACITY,
  type ColumnUnit,
  CURRENT,
  type FieldSpec,
  MASS,
  MONEY,
  RESISTANCE,
  TEMPERATURE,
  VOLTAGE,
  WHOLE,
} from "./field-spec";

const LARGEST = 2_000_000_000;
const PERCENT: readonly ColumnUnit[] = [{ name: "%", digits: 4 }];

function number(
  key: string,
  label: string,
  units: readonly ColumnUnit[],
  [min, max]: readonly [number, number],
  heads: readonly string[],
): FieldSpec {
  return { key, label, type: "scaled", units, min, max, heads };
}

function text(key: string, label: string, heads: readonly string[]): FieldSpec {
  return { key, label, type: "text", longest: 200, heads };
}

const CHEMISTRY_WORDS = {
  alkaline: "alkaline",
  zinccarbon: "zinc-carbon",
  lifes2: "li-fes2",
  lisocl2: "li-socl2",
  limno2: "li-mno2",
  silveroxide: "silver-oxide",
  vrla: "vrla",
  leadacid: "vrla",
  lifepo4: "lifepo4",
};

const VOLTS = [1, 60_000] as const;
const CELSIUS = [-600, 1000] as const;

/**
 * A cell type. A further row with the same designation needs only the capacity point: what one
 * cell gives at that current, down to that cut-off, at that temperature.
 */
export const CELL_TYPE_FIELDS: readonly FieldSpec[] = [
  { ...text("designation", "Designation", ["cell type", "cell", "type"]), required: true },
  text("name", "Name", ["cell name", "description"]),
  {
    ...{ key: "chemistry", label: "Chemistry", type: "choice", words: CHEMISTRY_WORDS },
    heads: ["system"],
  },
  text("size", "Size", ["cell size"]),
  number("nominal", "Nominal voltage", VOLTAGE, VOLTS, ["nominal"]),
  number("capacity", "Rated capacity", CAPACITY, [1, LARGEST], ["capacity"]),
  number("ratedCurrent", "Rated current", CURRENT, [1, LARGEST], ["rated at", "rated at current"]),
  number("ratedCutoff", "Rated cut-off", VOLTAGE, VOLTS, ["rated cutoff voltage"]),
  number("ratedTemperature", "Rated temperature", TEMPERATURE, CELSIUS, ["rated temp"]),
  number(
    "selfDischarge",
    "Self-discharge a year",
    PERCENT,
    [0, 1_000_000],
    [
      "self discharge",
      "self discharge percent per year",
      "self discharge percent",
      "self discharge percent a year",
    ],
  ),
  number("resistance", "Resistance", RESISTANCE, [1, LARGEST], ["internal resistance"]),
  number("maxPulse", "Largest pulse", CURRENT, [1, LARGEST], ["max pulse", "maximum pulse"]),
  number("mass", "Mass", MASS, [1, LARGEST], ["weight"]),
  number("shelfLife", "Shelf life in months", WHOLE, [1, 600], ["shelf life", "shelf life months"]),
  number("unitCost", "Unit cost", MONEY, [0, 100_000_000], ["cost", "price", "cell cost"]),
  number("reorderPoint", "Reorder point", WHOLE, [0, 1_000_000], ["reorder at", "reorder"]),
  number("leadTime", "Lead time in days", WHOLE, [0, 1000], ["lead time", "lead time days"]),
  number("pointCurrent", "Point current", CURRENT, [1, LARGEST], ["table current", "at current"]),
  number("pointCutoff", "Point cut-off", VOLTAGE, VOLTS, ["table cutoff", "at cutoff"]),
  number("pointTemperature", "Point temperature", TEMPERATURE, CELSIUS, [
    "table temperature",
    "at temperature",
  ]),
  number("pointCapacity", "Point capacity", CAPACITY, [1, LARGEST], ["table capacity"]),
  text("pointSource", "Point source", ["table source", "source"]),
];

/** A device model with its duty cycle. */
export const DEVICE_MODEL_FIELDS: readonly FieldSpec[] = [
  { ...text("name", "Name", ["model", "device model", "model name"]), required: true },
  { ...number("cutoff", "Cut-off", VOLTAGE, VOLTS, ["cutoff voltage"]), required: true },
  { ...number("series", "Series", WHOLE, [1, 24], ["cells in series"]), required: true },
  number("parallel", "Parallel", WHOLE, [1, 12], ["cells in parallel"]),
  {
    ...{ key: "cells", label: "Cell types", type: "text", longest: 500, required: true },
    heads: ["accepted cells", "accepted cell types", "cells"],
  },
  {
    ...{ key: "duty", label: "Duty cycle", type: "text", longest: 2000, required: true },
    heads: ["duty", "states", "duty states"],
  },
  number("swapMinutes", "Swap minutes", WHOLE, [1, 480], ["swap time", "minutes to swap"]),
  number("readMinutes", "Read minutes", WHOLE, [1, 480], ["read time", "minutes to read"]),
  number(
    "silence",
    "Cost of an hour without data",
    MONEY,
    [0, 100_000_000],
    ["silence cost", "silence cost per hour", "cost per hour without data"],
  ),
  number(
    "habit",
    "Habit interval in days",
    WHOLE,
    [1, 20_000],
    ["habit", "habit days", "habit interval", "habit interval days", "usual interval days"],
  ),
];

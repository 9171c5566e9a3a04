import { writeDuty } from "@/lib/csv/read-duty";
import type { CatalogueCell } from "../simulate/scenario/catalogue-cell";
import type { Scenario } from "../simulate/scenario/scenario";
import { decimals, money, type TextTable } from "./text-table";

function pointColumns(points: CatalogueCell["capacityTable"], n: number): string[] {
  const point = points[n];
  if (!point) return ["", "", "", "", ""];
  return [
    decimals(point.currentUa, 3),
    decimals(point.cutoffMv, 3),
    decimals(point.temperatureDc, 1),
    decimals(point.capacityMah, 3),
    point.source,
  ];
}

const CELL_HEAD = [
  "designation",
  "name",
  "chemistry",
  "size",
  "nominal voltage V",
  "rated capacity Ah",
  "rated current mA",
  "rated cut-off V",
  "rated temperature C",
  "self-discharge percent per year",
  "resistance ohm",
  "max pulse mA",
  "mass g",
  "shelf life months",
  "unit cost",
  "reorder point",
  "lead time days",
  "point current mA",
  "point cut-off V",
  "point temperature C",
  "point capacity Ah",
  "point source",
];

function cellRows(c: CatalogueCell): string[][] {
  const facts = [
    c.designation,
    c.name,
    c.chemistry,
    c.size,
    decimals(c.nominalMv, 3),
    decimals(c.rated.capacityMah, 3),
    decimals(c.rated.currentUa, 3),
    decimals(c.rated.cutoffMv, 3),
    decimals(c.rated.temperatureDc, 1),
    decimals(c.selfDischargePpmPerYear, 4),
    decimals(c.resistanceMohm, 3),
    decimals(c.maxPulseUa, 3),
    decimals(c.massMg, 3),
    String(c.shelfLifeMonths),
    money(c.unitCostMinor),
    String(c.reorderPoint),
    String(c.leadTimeDays),
  ];
  const further = c.capacityTable
    .slice(1)
    .map((_, i) => [
      c.designation,
      ...facts.slice(1).map(() => ""),
      ...pointColumns(c.capacityTable, i + 1),
    ]);
  return [[...facts, ...pointColumns(c.capacityTable, 0)], ...further];
}

export function cellTypeTable(s: Scenario): TextTable {
  return [CELL_HEAD, ...s.cellTypes.flatMap(cellRows)];
}

export function deviceModelTable(s: Scenario): TextTable {
  const head = [
    "name",
    "cut-off V",
    "series",
    "parallel",
    "accepted cell types",
    "duty cycle",
    "swap minutes",
    "read minutes",
    "silence cost per hour",
    "habit interval days",
  ];
  const rows = s.models.map((m) => [
    m.name,
    decimals(m.cutoffMv, 3),
    String(m.series),
    String(m.parallel),
    m.cellTypes.join(" | "),
    writeDuty(m.duty, "."),
    String(m.swapMinutes),
    String(m.readMinutes),
    money(m.silenceCostMinorPerHour),
    m.habitIntervalDays ? String(m.habitIntervalDays) : "",
  ]);
  return [head, ...rows];
}

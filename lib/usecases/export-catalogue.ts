import { listCapacityPoints, listCellTypes } from "@/db/queries/cell-types";
import { listDeviceModels } from "@/db/queries/device-models";
import { writeDuty } from "@/lib/csv/read-duty";
import type { OutCell } from "@/lib/csv/write-table";
import { type ExportContext, type OutTable, scaled } from "./export-table";

const TYPE_HEAD = [
  ...["designation", "name", "chemistry", "size", "nominal voltage V", "rated capacity Ah"],
  ...["rated current mA", "rated cut-off V", "rated temperature C"],
  ...["self-discharge percent per year", "resistance ohm", "largest pulse mA", "mass g"],
  ...["shelf life months", "unit cost", "reorder point", "lead time days"],
];
const POINT_HEAD = [
  ...["point current mA", "point cut-off V", "point temperature C", "point capacity Ah"],
  "point source",
];

/** Cell types; each further point of a capacity table is a row of its own. */
export async function cellTypeTable({ deps }: ExportContext): Promise<OutTable> {
  const points = await listCapacityPoints(deps.db);
  const types = await listCellTypes(deps.db);
  const blank: OutCell[] = TYPE_HEAD.slice(1).map(() => null);
  const rows = types.flatMap((type) => {
    const own = points.filter((p) => p.designation === type.designation).map(pointCells);
    const first: OutCell[] = own[0] ?? POINT_HEAD.map(() => null);
    const further = own.slice(1).map((cells) => [type.designation, ...blank, ...cells]);
    return [[...typeCells(type), ...first], ...further];
  });
  return { head: [...TYPE_HEAD, ...POINT_HEAD], rows };
}

function typeCells(t: Awaited<ReturnType<typeof listCellTypes>>[number]): OutCell[] {
  return [
    ...[t.designation, t.name, t.chemistry, t.size],
    ...[scaled(t.nominalMv, 3), scaled(t.ratedCapacityMah, 3), scaled(t.ratedCurrentUa, 3)],
    ...[scaled(t.ratedCutoffMv, 3), scaled(t.ratedTemperatureDc, 1)],
    ...[scaled(t.selfDischargePpmPerYear, 4), scaled(t.resistanceMohm, 3)],
    ...[scaled(t.maxPulseUa, 3), scaled(t.massMg, 3), scaled(t.shelfLifeMonths)],
    ...[scaled(t.unitCostMinor, 2), scaled(t.reorderPoint), scaled(t.leadTimeDays)],
  ];
}

function pointCells(p: Awaited<ReturnType<typeof listCapacityPoints>>[number]): OutCell[] {
  return [
    ...[scaled(p.currentUa, 3), scaled(p.cutoffMv, 3), scaled(p.temperatureDc, 1)],
    ...[scaled(p.capacityMah, 3), p.source],
  ];
}

/** Device models with their duty cycle in one cell. */
export async function deviceModelTable({ deps, decimal }: ExportContext): Promise<OutTable> {
  const models = await listDeviceModels(deps.db);
  return {
    head: [
      ...["name", "cut-off V", "series", "parallel", "accepted cell types", "duty cycle"],
      ...["swap minutes", "read minutes", "silence cost per hour", "habit interval days"],
    ],
    rows: models.map((m) => [
      ...[m.name, scaled(m.cutoffMv, 3), scaled(m.series), scaled(m.parallel)],
      m.cells.map((c) => c.designation).join(" | "),
      writeDuty(m.states, decimal),
      ...[scaled(m.swapMinutes), scaled(m.readMinutes), scaled(m.silenceCostMinorPerHour, 2)],
      scaled(m.habitIntervalDays),
    ]),
  };
}

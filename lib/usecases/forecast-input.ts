import type {
  DeviceEventRow,
  DrawShiftRow,
  ForecastCatalogueRows,
  PackToForecast,
  ReadingToForecast,
} from "@/db/queries/forecast-inputs";
import type {
  CapacityPoint,
  CellSpec,
  Chemistry,
  DutyState,
  FleetPrior,
  ForecastInput,
  PackEvent,
  PackReading,
} from "@/lib/battery/pack";
import { withDrawShift } from "@/lib/battery";
import { toEpochDays } from "@/lib/units";

/** Where a site has no climate: a temperate lowland year (assumption, shown in Settings). */
const TEMPERATE_YEAR_DC = [45, 47, 68, 92, 124, 153, 174, 173, 148, 112, 74, 50];

/** How well a current measured on the spot is known: one relative standard deviation. */
const MEASURED_DRAW_SD = 0.06;

/** The rows that all forecasts of a run share, arranged for look-up. */
export interface ForecastCatalogue {
  readonly cells: ReadonlyMap<string, CellSpec>;
  readonly models: ReadonlyMap<
    string,
    {
      cutoffMv: number;
      silenceCostMinorPerHour: number;
      swapMinutes: number;
      duty: readonly DutyState[];
    }
  >;
  readonly climates: ReadonlyMap<string, readonly number[]>;
  /** Price of one cell, minor units. */
  readonly cellPrices: ReadonlyMap<string, number>;
  readonly depots: readonly { latitude: number; longitude: number }[];
  /** Found shifts of the draw, by device model. */
  readonly drawShifts: ReadonlyMap<string, DrawShiftRow>;
}

export function arrangeCatalogue(rows: ForecastCatalogueRows): ForecastCatalogue {
  const points = groupBy(rows.points, (point) => point.cellTypeId);
  const states = groupBy(rows.states, (state) => state.deviceModelId);
  return {
    cells: new Map(
      rows.cellTypes.map((row) => [row.id, cellSpecOf(row, points.get(row.id) ?? [])]),
    ),
    models: new Map(rows.models.map((row) => [row.id, { ...row, duty: states.get(row.id) ?? [] }])),
    climates: new Map(rows.climates.map((row) => [row.id, row.monthlyMeanDc])),
    cellPrices: new Map(rows.cellTypes.map((row) => [row.id, row.unitCostMinor])),
    depots: rows.depots,
    drawShifts: new Map(rows.shifts.map((shift) => [shift.deviceModelId, shift])),
  };
}

/** The catalogue without what readings of the fleet showed: the sheets' word alone. */
export function withoutFindings(catalogue: ForecastCatalogue): ForecastCatalogue {
  return { ...catalogue, drawShifts: new Map() };
}

function cellSpecOf(
  row: ForecastCatalogueRows["cellTypes"][number],
  capacityTable: readonly CapacityPoint[],
): CellSpec {
  return {
    chemistry: row.chemistry as Chemistry,
    nominalMv: row.nominalMv,
    rated: {
      currentUa: row.ratedCurrentUa,
      cutoffMv: row.ratedCutoffMv,
      temperatureDc: row.ratedTemperatureDc,
      capacityMah: row.ratedCapacityMah,
    },
    capacityTable,
    selfDischargePpmPerYear: row.selfDischargePpmPerYear,
    resistanceMohm: row.resistanceMohm,
    maxPulseUa: row.maxPulseUa,
  };
}

/**
 * One pack's rows as the battery core wants them. A shift of its model's draw counts where it had
 * been found by `now`.
 */
export function forecastInputOf(
  catalogue: ForecastCatalogue,
  pack: PackToForecast,
  readings: readonly ReadingToForecast[],
  events: readonly DeviceEventRow[],
  prior: FleetPrior | null,
  now: Date,
): ForecastInput {
  const cell = catalogue.cells.get(pack.cellTypeId);
  const model = catalogue.models.get(pack.deviceModelId);
  if (!cell || !model) throw new Error(`pack ${pack.packId} names an unknown cell type or model`);
  const input: ForecastInput = {
    pack: {
      cell,
      series: pack.series,
      parallel: pack.parallel,
      cutoffMv: model.cutoffMv,
      duty: model.duty,
      measuredDraw: pack.measuredAverageUa
        ? { averageUa: pack.measuredAverageUa, relativeSd: MEASURED_DRAW_SD }
        : null,
      monthlyMeanDc: climateOf(catalogue, pack.climateId),
      madeAt: pack.madeOn ? toEpochDays(new Date(pack.madeOn)) : null,
      installedAt: toEpochDays(pack.installedAt),
    },
    readings: readings.map(readingOf),
    events: [...heardOf(pack), ...events.map(eventOf)].filter(
      (event) => event.at >= toEpochDays(pack.installedAt),
    ),
    prior,
    now: toEpochDays(now),
  };
  const shift = catalogue.drawShifts.get(pack.deviceModelId);
  return shift && shift.foundAt <= now ? shifted(input, shift, pack.measuredAt) : input;
}

function shifted(
  input: ForecastInput,
  { since, factor, relativeSd }: DrawShiftRow,
  measuredAt: Date | null,
): ForecastInput {
  const at = toEpochDays(new Date(since));
  return withDrawShift(input, { at, factor, relativeSd }, measuredAt && toEpochDays(measuredAt));
}

/** Mean temperature of each month where this climate holds, January first, in tenths of a degree. */
export function climateOf(
  catalogue: ForecastCatalogue,
  climateId: string | null,
): readonly number[] {
  return catalogue.climates.get(climateId ?? "") ?? TEMPERATE_YEAR_DC;
}

function readingOf(row: ReadingToForecast): PackReading {
  return { ...row, at: toEpochDays(row.at), kind: row.kind as PackReading["kind"] };
}

function heardOf(pack: PackToForecast): PackEvent[] {
  return pack.lastHeardAt ? [{ at: toEpochDays(pack.lastHeardAt), kind: "reporting" }] : [];
}

function eventOf(row: DeviceEventRow): PackEvent {
  const at = toEpochDays(row.at);
  if (row.kind === "reported") return { at, kind: "reporting" };
  if (row.kind !== "stopped") return { at, kind: "draw-changed" };
  return row.lastHeardAt
    ? { at, kind: "stopped", lastAliveAt: toEpochDays(row.lastHeardAt) }
    : { at, kind: "stopped" };
}

export function groupBy<Row>(rows: readonly Row[], key: (row: Row) => string): Map<string, Row[]> {
  const groups = new Map<string, Row[]>();
  for (const row of rows) {
    const group = groups.get(key(row));
    if (group) group.push(row);
    else groups.set(key(row), [row]);
  }
  return groups;
}

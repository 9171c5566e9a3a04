import type { FieldRoundRows, loadFieldModels, loadFieldSites } from "@/db/queries/field-day";
import type {
  DayCellType,
  DayModel,
  DayRound,
  DaySite,
  DayStop,
  DayTask,
} from "@/lib/sync/day-pack";
import { type ForecastCatalogue, groupBy } from "./forecast-input";

export function assembleRounds({ rounds, stops, tasks }: FieldRoundRows): DayRound[] {
  const stopsOf = groupBy(stops, (stop) => stop.roundId);
  const tasksOf = groupBy(tasks, (task) => task.stopId);
  return rounds.map((round) => ({
    ...round,
    state: round.state as DayRound["state"],
    startsAt: round.startsAt.toISOString(),
    endsAt: round.endsAt.toISOString(),
    reorderedAt: round.reorderedAt?.toISOString() ?? null,
    orderReplacedAt: round.orderReplacedAt?.toISOString() ?? null,
    stops: (stopsOf.get(round.id) ?? []).map(({ roundId: _, ...stop }) => ({
      ...stop,
      state: stop.state as DayStop["state"],
      arrivesAt: stop.arrivesAt.toISOString(),
      departsAt: stop.departsAt.toISOString(),
      doneAt: stop.doneAt?.toISOString() ?? null,
      tasks: (tasksOf.get(stop.id) ?? []).map(({ stopId: __, ...task }) => ({
        ...task,
        kind: task.kind as DayTask["kind"],
        state: task.state as DayTask["state"],
      })),
    })),
  }));
}

export function assembleSites({
  sites,
  closures,
}: Awaited<ReturnType<typeof loadFieldSites>>): DaySite[] {
  const closuresOf = groupBy(closures, (closure) => closure.siteId);
  return sites.map(({ driveUpNotes, ...site }) => ({
    ...site,
    opens: site.opens?.slice(0, 5) ?? null,
    closes: site.closes?.slice(0, 5) ?? null,
    notes: driveUpNotes,
    closures: (closuresOf.get(site.id) ?? []).map((closure) => ({
      from: closure.firstMonthDay,
      to: closure.lastMonthDay,
      reason: closure.reason,
    })),
  }));
}

export function assembleModels(
  { models, accepted }: Awaited<ReturnType<typeof loadFieldModels>>,
  catalogue: ForecastCatalogue,
): DayModel[] {
  const acceptedOf = groupBy(accepted, (row) => row.deviceModelId);
  return models.map((model) => {
    const known = catalogue.models.get(model.id);
    return {
      ...model,
      cutoffMv: known?.cutoffMv ?? 0,
      duty: (known?.duty ?? []).map(({ name, currentUa, durationMs }) => ({
        name,
        currentUa,
        durationMs,
      })),
      cellTypeIds: (acceptedOf.get(model.id) ?? []).map((row) => row.cellTypeId),
    };
  });
}

export function assembleCellTypes(
  wanted: ReadonlySet<string>,
  designations: ReadonlyMap<string, string>,
  catalogue: ForecastCatalogue,
): DayCellType[] {
  return [...wanted].sort().flatMap((id) => {
    const spec = catalogue.cells.get(id);
    const designation = designations.get(id);
    return spec && designation ? [{ id, designation, spec: withoutRowIds(spec) }] : [];
  });
}

/** The capacity table's rows carry database columns that the phone has no use for. */
function withoutRowIds(spec: DayCellType["spec"]): DayCellType["spec"] {
  return {
    ...spec,
    capacityTable: spec.capacityTable.map((point) => ({
      currentUa: point.currentUa,
      cutoffMv: point.cutoffMv,
      temperatureDc: point.temperatureDc,
      capacityMah: point.capacityMah,
    })),
  };
}

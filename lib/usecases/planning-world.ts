import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import { getOrganisation, type Organisation } from "@/db/queries/organisation";
import { bookedSwaps, loadBindingRounds, type StoredRound } from "@/db/queries/plan-rounds";
import {
  loadAcceptedCells,
  loadLotsOnHand,
  loadPacksToPlan,
  loadReturnDays,
  loadSitesToPlan,
  loadTechniciansToPlan,
} from "@/db/queries/planning-fleet";
import type {
  KnownVisit,
  PlanningPack,
  PlanningSite,
  PlanningTechnician,
  ReturnDay,
  Ticket,
} from "@/lib/planning/fleet";
import { addDays, localDay, secondsOfClock } from "@/lib/planning/local-time";
import type { PlanInput } from "@/lib/planning/plan";
import { toEpochDays } from "@/lib/units";

/** What a plan covers: these days, and the technicians of these crews (all when empty). */
export interface PlanCover {
  readonly firstDay: string;
  readonly lastDay: string;
  readonly crewIds: readonly string[];
}

export type TechnicianRow = Awaited<ReturnType<typeof loadTechniciansToPlan>>[number];

export interface PlanningWorld {
  readonly organisation: Organisation;
  readonly technicians: readonly TechnicianRow[];
  /** Rounds that bind the covered technicians on the covered days. */
  readonly binding: readonly StoredRound[];
  readonly input: PlanInput;
}

export interface WorldOptions {
  /** Only these sites; null: every site of the crews. */
  readonly siteIds: readonly string[] | null;
  readonly known: readonly KnownVisit[];
  readonly excludedAssets: ReadonlySet<string>;
  /** Days after the covered ones that a new plan looks at; left out: none. */
  readonly lookAheadDays?: number;
}

/** Whether a plan may change a round: published and not begun, of a covered technician and day. */
export function isCovered(
  round: { readonly technicianId: string; readonly day: string; readonly state: string },
  cover: PlanCover,
  technicianIds: ReadonlySet<string>,
): boolean {
  return (
    round.state === "published" &&
    technicianIds.has(round.technicianId) &&
    cover.firstDay <= round.day &&
    round.day <= cover.lastDay
  );
}

/** Everything the planner needs, read from the database. */
export async function loadWorld(
  db: Kysely<Database>,
  now: Date,
  cover: PlanCover,
  options: WorldOptions,
): Promise<PlanningWorld> {
  const organisation = await getOrganisation(db);
  const today = localDay(now, organisation.timeZone);
  const [technicians, sites, packs, accepted, lots, booked, returns] = await Promise.all([
    loadTechniciansToPlan(db, cover.crewIds),
    loadSitesToPlan(db, { crewIds: cover.crewIds, siteIds: options.siteIds }),
    loadPacksToPlan(db, options.siteIds),
    loadAcceptedCells(db),
    loadLotsOnHand(db),
    bookedSwaps(db, today),
    loadReturnDays(db, today),
  ]);
  const returnOf = new Map(returns.map((row) => [row.siteId, row]));
  const covered = new Set(technicians.map((technician) => technician.id));
  const elsewhere = booked.filter((swap) => !isCovered(swap, cover, covered));
  const onHand = cellsOnHand(lots, elsewhere);
  const bookedAssets = new Set(elsewhere.map((swap) => swap.assetId));
  const { lookAheadDays = 0 } = options;
  const lookedAt = addDays(cover.lastDay, lookAheadDays);
  const bound = await loadBindingRounds(db, [...covered], cover.firstDay, lookedAt);
  const binding = bound.filter((round) => round.day <= cover.lastDay);
  const input: PlanInput = {
    ...reckoning(organisation, now, cover),
    lookAheadDays,
    technicians: technicians.map((row) => technicianOf(row, bound, cover)),
    sites: sites.map((row) => siteOf(row, returnOf.get(row.id))),
    packs: packs
      .filter((pack) => !bookedAssets.has(pack.assetId))
      .map((pack) => packOf(pack, accepted, onHand)),
    cellsOnHand: onHand,
    known: options.known,
    excludedAssets: options.excludedAssets,
  };
  return { organisation, technicians, binding, input };
}

/** Days, prices and roads as the organisation has set them. */
function reckoning(
  organisation: Organisation,
  now: Date,
  { firstDay, lastDay }: PlanCover,
): Pick<PlanInput, "frame" | "prices" | "road"> {
  const { timeZone, workingDays } = organisation;
  return {
    frame: { timeZone, now, firstDay, lastDay, workingDays },
    prices: {
      crewMinorPerHour: organisation.crewCostMinorPerHour,
      overtimeMinorPerHour: organisation.overtimeCostMinorPerHour,
      travelMinorPerKm: organisation.travelCostMinorPerKm,
    },
    road: { detourFactor: organisation.detourFactor, speedKmh: organisation.roadSpeedKmh },
  };
}

/** Cells by type that no round outside the plan has been promised. */
function cellsOnHand(
  lots: readonly { readonly cellTypeId: string; readonly cells: number }[],
  promised: readonly { readonly cellTypeId: string | null; readonly cells: number }[],
): Map<string, number> {
  const onHand = new Map<string, number>();
  const add = (type: string, cells: number) => onHand.set(type, (onHand.get(type) ?? 0) + cells);
  for (const lot of lots) add(lot.cellTypeId, lot.cells);
  for (const task of promised) if (task.cellTypeId) add(task.cellTypeId, -task.cells);
  return onHand;
}

function technicianOf(
  row: TechnicianRow,
  bound: readonly StoredRound[],
  { lastDay }: PlanCover,
): PlanningTechnician {
  return {
    technicianId: row.id,
    name: row.name,
    crewId: row.crewId,
    depot: { latitude: row.latitude, longitude: row.longitude },
    tickets: row.tickets as Ticket[],
    shifts: row.shifts.map((shift) => ({
      weekday: shift.weekday,
      startsS: secondsOfClock(shift.starts),
      endsS: secondsOfClock(shift.ends),
      pause:
        shift.breakStarts && shift.breakEnds
          ? { startsS: secondsOfClock(shift.breakStarts), endsS: secondsOfClock(shift.breakEnds) }
          : null,
    })),
    absences: row.absences,
    vanCells: row.cellCapacity,
    takenDays: bound
      .filter((round) => round.technicianId === row.id)
      .filter((round) => round.state !== "published" || round.day > lastDay)
      .map((round) => round.day),
  };
}

function siteOf(
  row: Awaited<ReturnType<typeof loadSitesToPlan>>[number],
  back: Awaited<ReturnType<typeof loadReturnDays>>[number] | undefined,
): PlanningSite {
  const { id, opens, closes, tickets, ...rest } = row;
  return {
    ...rest,
    siteId: id,
    tickets: tickets as Ticket[],
    hours:
      opens && closes ? { opensS: secondsOfClock(opens), closesS: secondsOfClock(closes) } : null,
    returnOn: back ? { day: back.day, reason: back.reason as ReturnDay["reason"] } : null,
  };
}

function packOf(
  row: Awaited<ReturnType<typeof loadPacksToPlan>>[number],
  accepted: Awaited<ReturnType<typeof loadAcceptedCells>>,
  onHand: ReadonlyMap<string, number>,
): PlanningPack {
  const cells = row.series * row.parallel;
  const takes = accepted.filter((cell) => cell.deviceModelId === row.deviceModelId);
  // The preferred type comes first; another one goes in only where that one has run out.
  const chosen = takes.find((cell) => (onHand.get(cell.cellTypeId) ?? 0) >= cells) ?? takes[0];
  return {
    packId: row.packId,
    assetId: row.assetId,
    tag: row.tag,
    assetName: row.assetName,
    siteId: row.siteId,
    life: row.cdfDays,
    installedAt: toEpochDays(row.installedAt),
    shareLeft: row.shareLeftPermille / 1000,
    silenceMinorPerHour: row.ownSilenceCostMinorPerHour ?? row.silenceCostMinorPerHour,
    cellTypeId: chosen?.cellTypeId ?? row.installedCellTypeId,
    designation: chosen?.designation ?? "",
    cells,
    cellsMinor: cells * (chosen?.unitCostMinor ?? 0),
    swapS: row.swapMinutes * 60,
    readS: row.readMinutes * 60,
    habitIntervalDays: row.habitIntervalDays,
  };
}

/** The visits of stored rounds, as the planner knows them. */
export function knownVisits(rounds: readonly StoredRound[]): KnownVisit[] {
  return rounds.flatMap((round) =>
    round.stops.map((stop) => ({
      siteId: stop.siteId,
      technicianId: round.technicianId,
      day: round.day,
      position: stop.position,
      locked: stop.locked,
      tasks: stop.tasks.map(({ id: _, ...task }) => task),
    })),
  );
}

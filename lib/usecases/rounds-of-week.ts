import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import { loadBindingRounds, loadPlanRounds, type StoredRound } from "@/db/queries/plan-rounds";
import type { PlanRow } from "@/db/queries/plans";
import type { loadTechniciansToPlan } from "@/db/queries/planning-fleet";
import { loadRoundSheets, type SheetStop } from "@/db/queries/round-sheets";
import { secondsOfClock, weekdayOf } from "@/lib/planning/local-time";
import type { BoardRoundInput } from "@/lib/present/rounds-board";

type Technicians = Awaited<ReturnType<typeof loadTechniciansToPlan>>;

interface Days {
  readonly firstDay: string;
  readonly lastDay: string;
}

/**
 * The rounds that stand on some days: those that bind, and in their place, where a draft covers
 * them, the draft's. Of drafts that overlap the first counts. Rounds that have begun always show.
 */
export async function roundsShown(
  db: Kysely<Database>,
  technicians: Technicians,
  days: Days,
  drafts: readonly PlanRow[],
): Promise<StoredRound[]> {
  const crewOf = new Map(technicians.map((t) => [t.id, t.crewId]));
  const binding = await loadBindingRounds(db, [...crewOf.keys()], days.firstDay, days.lastDay);
  const shown = withoutOverlaps(drafts);
  const isCovered = (round: StoredRound) =>
    shown.some(
      (draft) =>
        overlap(draft, { firstDay: round.day, lastDay: round.day }) &&
        (draft.crewIds.length === 0 ||
          draft.crewIds.includes(crewOf.get(round.technicianId) ?? "")),
    );
  const kept = binding.filter((round) => round.state !== "published" || !isCovered(round));
  const proposed = await Promise.all(shown.map((draft) => loadPlanRounds(db, draft.id)));
  return [...kept, ...proposed.flat()].filter(
    (r) => r.day >= days.firstDay && r.day <= days.lastDay && crewOf.has(r.technicianId),
  );
}

function overlap(a: Days, b: Days): boolean {
  return a.firstDay <= b.lastDay && b.firstDay <= a.lastDay;
}

function withoutOverlaps(drafts: readonly PlanRow[]): PlanRow[] {
  return drafts.reduce<PlanRow[]>(
    (kept, draft) => (kept.some((k) => overlap(k, draft)) ? kept : [...kept, draft]),
    [],
  );
}

/** Length of a technician's shift on a day; 0 when there is none. */
export function shiftS(technician: Technicians[number] | undefined, day: string): number {
  const shift = technician?.shifts.find((s) => s.weekday === weekdayOf(day));
  return shift ? secondsOfClock(shift.ends) - secondsOfClock(shift.starts) : 0;
}

/** Rounds with their sheets, as the board presents them. */
export async function boardInputs(
  db: Kysely<Database>,
  technicians: Technicians,
  rounds: readonly StoredRound[],
): Promise<BoardRoundInput[]> {
  const sheets = await loadRoundSheets(
    db,
    rounds.map((round) => round.id),
  );
  const byRound = new Map<string, SheetStop[]>();
  for (const stop of sheets)
    byRound.set(stop.roundId, [...(byRound.get(stop.roundId) ?? []), stop]);
  return rounds.map((round) => {
    const technician = technicians.find((t) => t.id === round.technicianId);
    return {
      ...round,
      roundId: round.id,
      technicianName: technician?.name ?? "",
      shiftS: shiftS(technician, round.day),
      depot: { latitude: technician?.latitude ?? 0, longitude: technician?.longitude ?? 0 },
      stops: byRound.get(round.id) ?? [],
    };
  });
}

import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import { loadBindingRounds, loadPlanRounds, type StoredRound } from "@/db/queries/plan-rounds";
import type { PlanRow } from "@/db/queries/plans";
import type { loadTechniciansToPlan } from "@/db/queries/planning-fleet";
import { loadRoundSheets, type SheetStop } from "@/db/queries/round-sheets";
import { secondsOfClock, weekdayOf } from "@/lib/planning/local-time";
import type { BoardRoundInput } from "@/lib/present/rounds-board";

type Technicians = Awaited<ReturnType<typeof loadTechniciansToPlan>>;

/**
 * The rounds that stand on some days: those that bind, and in their place, where a draft covers
 * them, the draft's. Rounds that have begun always show.
 */
export async function roundsShown(
  db: Kysely<Database>,
  technicians: Technicians,
  days: { readonly firstDay: string; readonly lastDay: string },
  draft: PlanRow | null,
): Promise<StoredRound[]> {
  const ids = technicians.map((technician) => technician.id);
  const binding = await loadBindingRounds(db, ids, days.firstDay, days.lastDay);
  if (!draft) return binding;
  const crews = new Set(draft.crewIds);
  const covered = (round: StoredRound) => {
    const crewId = technicians.find((t) => t.id === round.technicianId)?.crewId ?? "";
    const inCrews = crews.size === 0 || crews.has(crewId);
    return inCrews && draft.firstDay <= round.day && round.day <= draft.lastDay;
  };
  const kept = binding.filter((round) => round.state !== "published" || !covered(round));
  const proposed = await loadPlanRounds(db, draft.id);
  return [...kept, ...proposed].filter((r) => r.day >= days.firstDay && r.day <= days.lastDay);
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

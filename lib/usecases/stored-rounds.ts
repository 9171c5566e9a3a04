import type { StoredRound, StoredStop } from "@/db/queries/plan-rounds";
import type { PlannedRound, PlannedStop } from "@/lib/planning/rounds";

/** The name of a technician's day. */
export function dayKey(round: { readonly technicianId: string; readonly day: string }): string {
  return `${round.technicianId} ${round.day}`;
}

/**
 * Rounds as they are stored. What stands already keeps its identity: a round by technician and
 * day, a stop by its site, a task by its asset, so that nobody who looks at one loses it.
 */
export function toStored(
  planId: string,
  planned: readonly PlannedRound[],
  before: readonly StoredRound[],
  newId: () => string,
): StoredRound[] {
  const rounds = new Map(before.map((round) => [dayKey(round), round]));
  const stops = new Map(before.flatMap((r) => r.stops.map((s) => [s.siteId, s] as const)));
  return planned.map(({ stops: ordered, ...round }) => {
    const was = rounds.get(dayKey(round));
    const id = was?.id ?? newId();
    return {
      ...round,
      id,
      planId,
      state: "proposed",
      icalUid: was?.icalUid ?? `${id}@rounds.wanewright`,
      icalSequence: was?.icalSequence ?? 0,
      stops: ordered.map((stop) => storedStop(stop, stops.get(stop.siteId), newId)),
    };
  });
}

function storedStop(
  stop: PlannedStop,
  was: StoredStop | undefined,
  newId: () => string,
): StoredStop {
  const tasks = new Map(was?.tasks.map((task) => [task.assetId, task]));
  return {
    id: was?.id ?? newId(),
    siteId: stop.siteId,
    position: stop.position,
    arrivesAt: stop.arrivesAt,
    departsAt: stop.departsAt,
    locked: was?.locked ?? false,
    tasks: stop.tasks.map((task) => ({ ...task, id: tasks.get(task.assetId)?.id ?? newId() })),
  };
}

/** Copies of rounds for another plan, with new ids throughout. */
export function copyRounds(
  planId: string,
  rounds: readonly StoredRound[],
  newId: () => string,
): StoredRound[] {
  return rounds.map((round) => {
    const id = newId();
    return {
      ...round,
      id,
      planId,
      state: "proposed" as const,
      icalUid: `${id}@rounds.wanewright`,
      icalSequence: 0,
      stops: round.stops.map((stop) => ({
        ...stop,
        id: newId(),
        tasks: stop.tasks.map((task) => ({ ...task, id: newId() })),
      })),
    };
  });
}

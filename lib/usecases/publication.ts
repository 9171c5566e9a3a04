import type { StoredRound, StoredStop } from "@/db/queries/plan-rounds";
import { type OwnOrder, type OwnOrders, settleOwnOrder } from "./own-order";
import { dayKey } from "./stored-rounds";

/** What publishing a draft does to one technician's day. */
export interface DayChange {
  readonly news: "published" | "changed" | "cancelled" | "unchanged";
  readonly technicianId: string;
  readonly day: string;
  /** The round in the draft; null when the day is given up. */
  readonly draft: StoredRound | null;
  /** The round that bound until now; null when there was none. */
  readonly before: StoredRound | null;
  readonly ownOrder: OwnOrder;
}

/** A round whose times move by less keeps its place in people's minds: no mail for it. */
const SAME_WITHIN_MS = 5 * 60_000;

/** Every technician's day that a draft touches, by day. `binding`: what it may change. */
export function dayChanges(
  draft: readonly StoredRound[],
  binding: readonly StoredRound[],
  orders: OwnOrders,
): DayChange[] {
  const before = new Map(binding.map((round) => [dayKey(round), round]));
  const kept = draft.map((round): DayChange => {
    const { technicianId, day } = round;
    const was = before.get(dayKey(round)) ?? null;
    const none = { news: "published", draft: round, before: null, ownOrder: "none" } as const;
    if (!was) return { ...none, technicianId, day };
    const settled = settleOwnOrder(round, was, orders);
    const news = sameRound(was, settled.draft) ? "unchanged" : "changed";
    return { ...settled, news, technicianId, day, before: was };
  });
  const drafted = new Set(draft.map(dayKey));
  const gone = binding
    .filter((round) => !drafted.has(dayKey(round)))
    .map((round): DayChange => {
      const { technicianId, day } = round;
      const gone = { news: "cancelled", draft: null, ownOrder: "none" } as const;
      return { ...gone, technicianId, day, before: round };
    });
  return [...kept, ...gone].sort((a, b) => (a.day < b.day ? -1 : a.day > b.day ? 1 : 0));
}

function sameRound(a: StoredRound, b: StoredRound): boolean {
  return (
    a.stops.length === b.stops.length &&
    near(a.startsAt, b.startsAt) &&
    near(a.endsAt, b.endsAt) &&
    a.stops.every((stop, i) => sameStop(stop, b.stops[i]!))
  );
}

function sameStop(a: StoredStop, b: StoredStop): boolean {
  const work = (stop: StoredStop) =>
    stop.tasks.map((t) => `${t.assetId} ${t.kind} ${t.cellTypeId} ${t.cells}`).sort();
  return (
    a.siteId === b.siteId && near(a.arrivesAt, b.arrivesAt) && work(a).join() === work(b).join()
  );
}

function near(a: Date, b: Date): boolean {
  return Math.abs(a.getTime() - b.getTime()) < SAME_WITHIN_MS;
}

const OWN_ORDER_WORDS = {
  none: "",
  kept: "Your own order of the stops is kept.",
  replaced: "The office put the stops in another order: your own no longer holds.",
} as const;

/** What changed in a round, in words for its technician. */
export function changeWords(
  { draft, before, ownOrder }: DayChange,
  siteNames: ReadonlyMap<string, string>,
): string[] {
  if (!draft || !before) return [];
  const sites = (round: StoredRound) => round.stops.map((stop) => stop.siteId);
  const [was, is] = [sites(before), sites(draft)];
  const names = (ids: readonly string[]) => ids.map((id) => siteNames.get(id) ?? "a site");
  const added = names(is.filter((id) => !was.includes(id)));
  const gone = names(was.filter((id) => !is.includes(id)));
  const stayed = (ids: readonly string[], other: readonly string[]) =>
    ids.filter((id) => other.includes(id)).join();
  const words: string[] = [];
  if (added.length > 0) words.push(`New: ${added.join(", ")}.`);
  if (gone.length > 0) words.push(`No longer: ${gone.join(", ")}.`);
  if (stayed(was, is) !== stayed(is, was) && ownOrder !== "replaced") {
    words.push("The order changed.");
  }
  if (words.length === 0 && ownOrder !== "replaced") words.push("Times or tasks changed.");
  return ownOrder === "none" ? words : [...words, OWN_ORDER_WORDS[ownOrder]];
}

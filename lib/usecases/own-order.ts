import type { StoredRound, StoredStop } from "@/db/queries/plan-rounds";
import type { StopPoint } from "@/lib/sync/leg-times";
import { orderedAs, reordered } from "@/lib/sync/round-order";

/** What becomes of a technician's own order of a round when a draft of it is published. */
export type OwnOrder = "none" | "kept" | "replaced";

/** What the orders are judged by. */
export interface OwnOrders {
  /** When the technician's own order of a binding round reached us, by the round's id. */
  readonly heardAt: ReadonlyMap<string, Date>;
  readonly draftMadeAt: Date;
  readonly pointOf: (siteId: string) => StopPoint | null;
}

/**
 * An order that came after the draft was made was not known to whoever made it: it is kept, and what
 * the draft adds is put where the draft has it. One that came before was seen in the draft: where the
 * draft has another, the office meant it, and both are told.
 */
export function settleOwnOrder(
  draft: StoredRound,
  before: StoredRound,
  { heardAt, draftMadeAt, pointOf }: OwnOrders,
): { readonly draft: StoredRound; readonly ownOrder: OwnOrder } {
  const heard = heardAt.get(before.id);
  const [was, is] = [sitesOf(before), sitesOf(draft)];
  const wanted = orderedAs(is, was);
  if (!heard || wanted.every((site, n) => is[n] === site)) return { draft, ownOrder: "none" };
  if (heard < draftMadeAt) return { draft, ownOrder: "replaced" };
  return { draft: inOrder(draft, wanted, pointOf), ownOrder: "kept" };
}

const sitesOf = (round: StoredRound) => round.stops.map((stop) => stop.siteId);

/** The draft's stops in another order; the round ends as much later as its last visit does. */
function inOrder(
  draft: StoredRound,
  sites: readonly string[],
  pointOf: OwnOrders["pointOf"],
): StoredRound {
  const placed = draft.stops.map(({ siteId, position, arrivesAt, departsAt }) => ({
    ...{ id: siteId, position },
    ...{ arrivesAt: arrivesAt.toISOString(), departsAt: departsAt.toISOString() },
  }));
  const bySite = new Map(draft.stops.map((stop) => [stop.siteId, stop]));
  const stops = reordered(placed, sites, (stop) => pointOf(stop.id)).flatMap((place) => {
    const stop = bySite.get(place.id);
    const times = { arrivesAt: new Date(place.arrivesAt), departsAt: new Date(place.departsAt) };
    return stop ? [{ ...stop, position: place.position, ...times }] : [];
  });
  const later = endOf(stops) - endOf(draft.stops);
  return { ...draft, stops, endsAt: new Date(draft.endsAt.getTime() + later) };
}

const endOf = (stops: readonly StoredStop[]) => stops.at(-1)?.departsAt.getTime() ?? 0;

/**
 * What changes for people from one plan to another: visits by site, and the technician-days that
 * look different. Order within a day does not count here; the mails tell of it.
 */
import type { IsoDay } from "@/lib/units";

/** A visit where it stands in a plan. */
export interface PlacedVisit {
  readonly siteId: string;
  readonly technicianId: string;
  readonly day: IsoDay;
}

export interface MovedVisit {
  readonly siteId: string;
  readonly from: PlacedVisit;
  readonly to: PlacedVisit;
}

export interface PlanDifference {
  /** On another day, or with somebody else. */
  readonly moved: readonly MovedVisit[];
  readonly added: readonly PlacedVisit[];
  readonly dropped: readonly PlacedVisit[];
  /** Visits that stay on their day with their technician. */
  readonly kept: number;
  /** Days on which somebody's sites change, in order. */
  readonly touchedDays: readonly IsoDay[];
  /** Days with visits, before or after, on which nobody's sites change. */
  readonly untouchedDays: readonly IsoDay[];
}

const place = ({ technicianId, day }: PlacedVisit) => `${day} ${technicianId}`;

function bySite(visits: readonly PlacedVisit[]): Map<string, PlacedVisit[]> {
  const sites = new Map<string, PlacedVisit[]>();
  for (const visit of visits) sites.set(visit.siteId, [...(sites.get(visit.siteId) ?? []), visit]);
  return sites;
}

/** Takes out of `visits` those whose place is also in `others`, once each. */
function without(visits: readonly PlacedVisit[], others: readonly PlacedVisit[]): PlacedVisit[] {
  const left = others.map(place);
  return visits.filter((visit) => {
    const at = left.indexOf(place(visit));
    if (at >= 0) left.splice(at, 1);
    return at < 0;
  });
}

/** Compares two plans visit by visit. */
export function planDifference(
  before: readonly PlacedVisit[],
  after: readonly PlacedVisit[],
): PlanDifference {
  const [was, is] = [bySite(before), bySite(after)];
  const moved: MovedVisit[] = [];
  const added: PlacedVisit[] = [];
  const dropped: PlacedVisit[] = [];
  for (const siteId of new Set([...was.keys(), ...is.keys()])) {
    const [old, now] = [was.get(siteId) ?? [], is.get(siteId) ?? []];
    const [gone, come] = [without(old, now), without(now, old)];
    const pairs = Math.min(gone.length, come.length);
    for (let i = 0; i < pairs; i++) moved.push({ siteId, from: gone[i]!, to: come[i]! });
    dropped.push(...gone.slice(pairs));
    added.push(...come.slice(pairs));
  }
  const touched = new Set(
    [...added, ...dropped, ...moved.flatMap((m) => [m.from, m.to])].map(dayOf),
  );
  const days = [...new Set([...before, ...after].map(dayOf))].sort();
  return {
    moved,
    added,
    dropped,
    kept: before.length - moved.length - dropped.length,
    touchedDays: days.filter((day) => touched.has(day)),
    untouchedDays: days.filter((day) => !touched.has(day)),
  };
}

function dayOf({ day }: PlacedVisit): IsoDay {
  return day;
}

import type { Kysely } from "kysely";
import { z } from "zod";
import type { Database } from "@/db/client";
import { getOrganisation, type Organisation } from "@/db/queries/organisation";
import { loadBindingRounds, loadPlanRounds, type StoredRound } from "@/db/queries/plan-rounds";
import type { PlanRow } from "@/db/queries/plans";
import { loadTechniciansToPlan } from "@/db/queries/planning-fleet";
import { type SheetStop, loadRoundSheets } from "@/db/queries/round-sheets";
import { loadOwnOrders } from "@/db/queries/stop-order";
import { localDay } from "@/lib/planning/local-time";
import { planDifference } from "@/lib/planning/plan-difference";
import { formatDay } from "@/lib/present/format-day";
import { differenceWords } from "@/lib/present/plan-difference-words";
import { visitsOf } from "./compare-plans";
import { getPlan } from "./open-plan";
import { planShortages } from "./plan-shortages";
import { isCovered, type TechnicianRow } from "./planning-world";
import { type DayChange, dayChanges } from "./publication";
import { defineUseCase } from "./use-case";

/** What publishing a draft would do. */
export interface Publication {
  readonly plan: PlanRow;
  readonly organisation: Organisation;
  readonly technicians: readonly TechnicianRow[];
  readonly technicianIds: ReadonlySet<string>;
  readonly changes: readonly DayChange[];
  /** Stops of the draft and of what it replaces. */
  readonly stops: readonly SheetStop[];
  readonly siteNames: ReadonlyMap<string, string>;
  /** Days that nobody can drive any more, in words. */
  readonly stranded: readonly string[];
}

/** Compares a draft with the rounds that bind now. */
export async function readPublication(
  db: Kysely<Database>,
  now: Date,
  plan: PlanRow,
): Promise<Publication> {
  const organisation = await getOrganisation(db);
  const technicians = await loadTechniciansToPlan(db, plan.crewIds);
  const technicianIds = new Set(technicians.map((technician) => technician.id));
  const draft = await loadPlanRounds(db, plan.id);
  const all = await loadBindingRounds(db, [...technicianIds], plan.firstDay, plan.lastDay);
  const binding = all.filter((round) => isCovered(round, plan, technicianIds));
  const stops = await loadRoundSheets(
    db,
    [...draft, ...binding].map((round) => round.id),
  );
  const orders = await loadOwnOrders(
    db,
    binding.map((round) => round.id),
  );
  return {
    plan,
    organisation,
    technicians,
    technicianIds,
    changes: dayChanges(draft, binding, {
      heardAt: orders,
      draftMadeAt: plan.createdAt,
      pointOf: (siteId) => stops.find((stop) => stop.siteId === siteId) ?? null,
    }),
    stops,
    siteNames: new Map(stops.map((stop) => [stop.siteId, stop.siteName])),
    stranded: draft.flatMap((round) => whyStranded(round, all, technicians, now, organisation)),
  };
}

/** Why nobody can drive a round of the draft any more, in words; empty when it can be driven. */
function whyStranded(
  round: StoredRound,
  binding: readonly StoredRound[],
  technicians: readonly TechnicianRow[],
  now: Date,
  { locale }: Organisation,
): string[] {
  const technician = technicians.find((t) => t.id === round.technicianId);
  if (!technician) return ["somebody is no longer in the crews of this plan"];
  const { name } = technician;
  const day = formatDay(round.day, locale, { weekday: true, today: round.day });
  if (round.endsAt <= now) return [`${name}'s ${day} is over`];
  const begun = binding.some(
    (r) => r.technicianId === technician.id && r.day === round.day && r.state !== "published",
  );
  if (begun) return [`${name} has begun a round on ${day}`];
  const away = technician.absences.some((a) => a.firstDay <= round.day && round.day <= a.lastDay);
  return away ? [`${name} is away on ${day}`] : [];
}

/** What the draft does to visits that people know of; empty where nothing binds yet. */
function changesInWords({ changes, organisation }: Publication): string {
  const before = changes.flatMap((change) => (change.before ? visitsOf([change.before]) : []));
  const after = changes.flatMap((change) => (change.draft ? visitsOf([change.draft]) : []));
  if (before.length === 0) return "";
  return differenceWords(planDifference(before, after), organisation.locale);
}

/** Who would get which mail if the draft were published now. */
export const previewPublication = defineUseCase({
  name: "preview-publication",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ planId: z.uuid() }),
  async run(deps, _actor, { planId }) {
    const plan = await getPlan(deps.db, planId);
    const publication = await readPublication(deps.db, deps.now(), plan);
    const { changes, technicians, technicianIds, stops, stranded, organisation } = publication;
    const names = new Map(technicians.map((t) => [t.id, t]));
    const news = changes.filter((change) => change.news !== "unchanged");
    const roundIds = new Set(news.flatMap(({ draft }) => draft?.id ?? []));
    const draftIds = new Set(changes.flatMap(({ draft }) => draft?.id ?? []));
    const shortages = await planShortages(
      deps.db,
      localDay(deps.now(), organisation.timeZone),
      stops.filter((stop) => draftIds.has(stop.roundId)),
      (swap) => !isCovered(swap, plan, technicianIds),
    );
    const contacts = stops.filter((s) => roundIds.has(s.roundId) && s.contactEmail);
    return {
      stranded,
      shortages,
      difference: changesInWords(publication),
      unchanged: changes.length - news.length,
      mails: news.map(({ news: kind, technicianId, day, draft, ownOrder }) => ({
        ...{ kind, ownOrder },
        name: names.get(technicianId)?.name ?? "",
        email: names.get(technicianId)?.email ?? "",
        day: formatDay(day, organisation.locale, { weekday: true, today: plan.firstDay }),
        stops: draft?.stops.length ?? 0,
      })),
      contacts: contacts.map((stop) => ({
        name: stop.contactName ?? stop.contactEmail ?? "",
        siteName: stop.siteName,
      })),
    };
  },
});

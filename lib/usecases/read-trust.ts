import { z } from "zod";
import { listCrewNames } from "@/db/queries/crew-names";
import { listClaims } from "@/db/queries/forecast-claims";
import { meanShareLeft } from "@/db/queries/outcomes";
import { getOrganisation } from "@/db/queries/organisation";
import { surpriseFacts } from "@/db/queries/surprise-facts";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { expectedEnds, reliabilityCurve } from "@/lib/stats/reliability";
import { survivalQuantile, survivalSteps } from "@/lib/stats/survival";
import { MS_PER_DAY } from "@/lib/units";
import { groupBy } from "./forecast-input";
import { type HeldClaim, holdClaims } from "./held-claims";
import { quarterAround } from "./quarters";
import { type Deps, defineUseCase } from "./use-case";

export const TRUST_GROUPS = ["chemistry", "model", "crew", "quarter"] as const;
export type TrustGroup = (typeof TRUST_GROUPS)[number];

/** An end surprises outside the middle nine tenths of what had been said. */
const SURPRISE = 0.05;
const SURPRISES_SHOWN = 20;
/** Worked out so long after its quarter began, a claim was never shown to anybody. */
const HINDSIGHT_MS = 3 * MS_PER_DAY;

export const trustInput = z.object({
  days: z.coerce.number().int().min(30).max(1100).catch(365),
  group: z.enum(TRUST_GROUPS).catch("chemistry"),
  crew: z.uuid().nullable().catch(null),
});

/**
 * What was said at the start of each quarter against what came, whole and by group. Every pack
 * in service counts, not only those that came out: a pack that stops always comes out, so that
 * removals alone show more stops than were to be expected.
 */
export const readTrust = defineUseCase({
  name: "read-trust",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: trustInput,
  async run(deps, _actor, input) {
    const { organisation, since, held } = await heldSince(deps, input);
    const crews = await listCrewNames(deps.db);
    const firsts = held.filter((claim) => claim.first);
    const surprising = firsts.filter(isSurprise).sort(latestFirst);
    const shareLeft = await meanShareLeft(deps.db, since.at, input.crew);
    return {
      organisation,
      input,
      crews,
      since: since.day,
      today: dayOfInstant(deps.now(), organisation.timeZone),
      whole: { ...tally(held, firsts), shareLeft },
      inHindsight: held.filter(isHindsight).length / Math.max(1, held.length),
      curve: reliabilityCurve(firsts.map((claim) => claim.life)),
      groups: groupsOf(held, input.group),
      predictions: firsts.map(predictionOf),
      surprises: await explained(deps, surprising.slice(0, SURPRISES_SHOWN)),
      surprising: surprising.length,
    };
  },
});
export type TrustView = Awaited<ReturnType<typeof readTrust>>;

/** Claims of the quarters since the one in which the span of days begins, held against what came. */
export async function heldSince(
  deps: Deps,
  { days, crew }: { readonly days: number; readonly crew: string | null },
) {
  const organisation = await getOrganisation(deps.db);
  const from = new Date(deps.now().getTime() - days * MS_PER_DAY);
  const since = quarterAround(from, organisation.timeZone);
  const lines = await listClaims(deps.db, since.day, crew);
  return { organisation, since, held: holdClaims(lines, deps.now()) };
}

function isHindsight(claim: HeldClaim): boolean {
  return claim.keptAt.getTime() - claim.madeAt.getTime() > HINDSIGHT_MS;
}

function latestFirst(a: HeldClaim, b: HeldClaim): number {
  const moment = (claim: HeldClaim) => claim.endedAt?.getTime() ?? Infinity;
  return moment(a) === moment(b) ? b.life.chance - a.life.chance : moment(b) - moment(a);
}

/** Each with what may explain it. */
async function explained(deps: Deps, claims: readonly HeldClaim[]) {
  const facts = await surpriseFacts(
    deps.db,
    claims.map((claim) => claim.packId),
  );
  return claims.map((claim) => ({ ...claim, facts: facts.get(claim.packId) ?? null }));
}

function predictionOf({ packId, saidDays, foundDays, life }: HeldClaim) {
  return { key: packId, saidDays, foundDays, stopped: life.ended };
}

/** Alive beyond the window surprises too; alive within it says nothing yet. */
function isSurprise({ life }: HeldClaim): boolean {
  return life.chance > 1 - SURPRISE || (life.ended && life.chance < SURPRISE);
}

/** A pack has one claim in a quarter; in other groups its first is the one to judge whole lives by. */
function groupsOf(held: readonly HeldClaim[], group: TrustGroup) {
  const groups = [...groupBy(held, (claim) => groupName(claim, group))].map(([name, members]) => ({
    name,
    ...tally(
      members,
      members.filter((claim) => group === "quarter" || claim.first),
    ),
  }));
  return group === "quarter" ? groups.reverse() : groups.sort((a, b) => b.packs - a.packs);
}

/** Stops against those expected while the claims stood, and lives against the days said. */
function tally(held: readonly HeldClaim[], lives: readonly HeldClaim[]) {
  const stood = held.map((claim) => claim.stretch);
  const expected = expectedEnds(stood);
  return {
    packs: lives.length,
    stopped: stood.filter((stretch) => stretch.ended).length,
    expected: expected.mean,
    spread: expected.spread,
    surprises: lives.filter(isSurprise).length,
    lasted: medianLasted(lives),
  };
}

/**
 * Median of days found over days said, packs that run or came out alive counted as far as they
 * got (Kaplan-Meier); null while fewer than half have ended.
 */
function medianLasted(lives: readonly HeldClaim[]): number | null {
  const ratios = lives.map(({ saidDays, foundDays, life }) => ({
    time: foundDays / Math.max(1, saidDays),
    ended: life.ended,
  }));
  return survivalQuantile(survivalSteps(ratios));
}

function groupName(claim: HeldClaim, group: TrustGroup): string {
  if (group === "chemistry") return claim.chemistry;
  if (group === "model") return claim.modelName;
  if (group === "crew") return claim.crewName ?? "no crew";
  const [year, month] = claim.quarter.split("-");
  return `${year} Q${Math.ceil(Number(month) / 3)}`;
}

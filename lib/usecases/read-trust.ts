import { z } from "zod";
import { listCrewNames } from "@/db/queries/crew-names";
import { listOutcomes, type OutcomeLine } from "@/db/queries/outcomes";
import { getOrganisation } from "@/db/queries/organisation";
import { surpriseFacts } from "@/db/queries/surprise-facts";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { expectedEnds, reliabilityCurve, type StatedEnd } from "@/lib/stats/reliability";
import { MS_PER_DAY } from "@/lib/units";
import { groupBy } from "./forecast-input";
import { type Deps, defineUseCase } from "./use-case";

export const TRUST_GROUPS = ["chemistry", "model", "crew", "quarter"] as const;
export type TrustGroup = (typeof TRUST_GROUPS)[number];

/** An end surprises outside the middle nine tenths of what had been said. */
const SURPRISE = 0.05;
const SURPRISES_SHOWN = 20;

export const trustInput = z.object({
  days: z.coerce.number().int().min(30).max(3650).catch(365),
  group: z.enum(TRUST_GROUPS).catch("chemistry"),
  crew: z.uuid().nullable().catch(null),
});

/** Stated chances against what was found at each removal, whole and by group. */
export const readTrust = defineUseCase({
  name: "read-trust",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: trustInput,
  async run(deps, _actor, input) {
    const organisation = await getOrganisation(deps.db);
    const since = new Date(deps.now().getTime() - input.days * MS_PER_DAY);
    const [lines, crews] = await Promise.all([
      listOutcomes(deps.db, { since, chemistry: null, deviceModelId: null, crewId: input.crew }),
      listCrewNames(deps.db),
    ]);
    const named = (line: OutcomeLine) => groupName(line, input.group, organisation.timeZone);
    return {
      organisation,
      input,
      crews,
      today: dayOfInstant(deps.now(), organisation.timeZone),
      whole: tally(lines),
      curve: reliabilityCurve(lines.map(statedOf)),
      groups: [...groupBy(lines, named)]
        .map(([name, members]) => ({ name, ...tally(members) }))
        .sort((a, b) => (input.group === "quarter" ? 0 : b.removals - a.removals)),
      predictions: lines.map(predictionOf),
      surprises: await explained(deps, lines.filter(isSurprise).slice(0, SURPRISES_SHOWN)),
      surprising: lines.filter(isSurprise).length,
    };
  },
});

/** Each with what may explain it. */
async function explained(deps: Deps, lines: readonly OutcomeLine[]) {
  const facts = await surpriseFacts(
    deps.db,
    lines.map((line) => line.packId),
  );
  return lines.map((line) => ({ ...line, facts: facts.get(line.packId) ?? null }));
}

/** Days left at the visit before, as said and as found. */
function predictionOf(line: OutcomeLine) {
  const from = line.forecastAt.getTime();
  return {
    key: line.packId,
    saidDays: (line.p50.getTime() - from) / MS_PER_DAY,
    foundDays: (line.endedAt.getTime() - from) / MS_PER_DAY,
    stopped: !line.censored,
  };
}

export type TrustView = Awaited<ReturnType<typeof readTrust>>;

function statedOf(line: OutcomeLine): StatedEnd {
  return { chance: line.chanceStoppedPermille / 1000, ended: !line.censored };
}

/** Alive beyond the window surprises too; alive within it says nothing yet. */
function isSurprise(line: OutcomeLine): boolean {
  const { chance, ended } = statedOf(line);
  return chance > 1 - SURPRISE || (ended && chance < SURPRISE);
}

/** Removals, how many had stopped, how many should have by what was said, and surprises. */
function tally(lines: readonly OutcomeLine[]) {
  const stated = lines.map(statedOf);
  const expected = expectedEnds(stated);
  const left = lines.filter((line) => line.censored);
  return {
    removals: lines.length,
    stopped: stated.filter((s) => s.ended).length,
    expected: expected.mean,
    spread: expected.spread,
    surprises: lines.filter(isSurprise).length,
    daysOff: medianDaysOff(lines),
    shareLeft:
      left.length > 0
        ? left.reduce((sum, line) => sum + line.shareLeftPermille, 0) / (1000 * left.length)
        : null,
  };
}

/** Of those that stopped: likely date less true date, in days; late is positive. */
function medianDaysOff(lines: readonly OutcomeLine[]): number | null {
  const off = lines
    .flatMap((line) => (line.stoppedAt ? [line.p50.getTime() - line.stoppedAt.getTime()] : []))
    .sort((a, b) => a - b);
  const middle = off[Math.floor(off.length / 2)];
  return middle === undefined ? null : middle / MS_PER_DAY;
}

function groupName(line: OutcomeLine, group: TrustGroup, timeZone: string): string {
  if (group === "chemistry") return line.chemistry;
  if (group === "model") return line.modelName;
  if (group === "crew") return line.crewName ?? "no crew";
  const [year, month] = dayOfInstant(line.removedAt ?? line.p50, timeZone).split("-");
  return `${year} Q${Math.ceil(Number(month) / 3)}`;
}

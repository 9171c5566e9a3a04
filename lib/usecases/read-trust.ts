import { z } from "zod";
import { listCrewNames } from "@/db/queries/crew-names";
import { listOutcomes, type OutcomeLine } from "@/db/queries/outcomes";
import { getOrganisation } from "@/db/queries/organisation";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { brierScore, reliabilityBins, type StatedChance } from "@/lib/stats/reliability";
import { MS_PER_DAY } from "@/lib/units";
import { groupBy } from "./forecast-input";
import { defineUseCase } from "./use-case";

export const TRUST_GROUPS = ["chemistry", "model", "crew", "quarter"] as const;
export type TrustGroup = (typeof TRUST_GROUPS)[number];

/** A removal surprises when what happened had been given less than one chance in twenty. */
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
      bins: reliabilityBins(lines.map(statedOf)),
      groups: [...groupBy(lines, named)]
        .map(([name, members]) => ({ name, ...tally(members) }))
        .sort((a, b) => (input.group === "quarter" ? 0 : b.removals - a.removals)),
      surprises: lines.filter(isSurprise).slice(0, SURPRISES_SHOWN),
      surprising: lines.filter(isSurprise).length,
    };
  },
});
export type TrustView = Awaited<ReturnType<typeof readTrust>>;

function statedOf(line: OutcomeLine): StatedChance {
  return { chance: line.chanceStoppedPermille / 1000, cameTrue: !line.censored };
}

function isSurprise(line: OutcomeLine): boolean {
  const { chance, cameTrue } = statedOf(line);
  return cameTrue ? chance < SURPRISE : chance > 1 - SURPRISE;
}

/** Removals, how many had stopped, how many were expected to have, and the score. */
function tally(lines: readonly OutcomeLine[]) {
  const stated = lines.map(statedOf);
  const expected = stated.reduce((sum, s) => sum + s.chance, 0);
  const variance = stated.reduce((sum, s) => sum + s.chance * (1 - s.chance), 0);
  return {
    removals: lines.length,
    stopped: stated.filter((s) => s.cameTrue).length,
    expected,
    /** Half the width of the range in which the count should lie nine times out of ten. */
    spread: 1.645 * Math.sqrt(variance),
    brier: lines.length > 0 ? brierScore(stated) : null,
    surprises: lines.filter(isSurprise).length,
    shareLeft:
      lines.length > 0
        ? lines.reduce((sum, line) => sum + line.shareLeftPermille, 0) / (1000 * lines.length)
        : null,
  };
}

function groupName(line: OutcomeLine, group: TrustGroup, timeZone: string): string {
  if (group === "chemistry") return line.chemistry;
  if (group === "model") return line.modelName;
  if (group === "crew") return line.crewName ?? "no crew";
  const [year, month] = dayOfInstant(line.removedAt ?? line.p50, timeZone).split("-");
  return `${year} Q${Math.ceil(Number(month) / 3)}`;
}

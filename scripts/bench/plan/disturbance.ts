/** How many visits move when a little of what the plan rests on changes. */
import { planDifference } from "@/lib/planning/plan-difference";
import type { PlanInput } from "@/lib/planning/plan";
import type { PlannedRound } from "@/lib/planning/rounds";
import type { Rng } from "@/lib/routing/rng";
import { seededRng } from "@/lib/routing/rng";
import { fleetInput, lifeAround } from "./fleet";
import { knownOf, planFleet } from "./scale";

export interface DisturbanceRow {
  readonly seed: number;
  readonly changedPacks: number;
  readonly visits: number;
  readonly moved: number;
  readonly added: number;
  readonly dropped: number;
  /** Visits of before that are on another day or with somebody else, or gone. */
  readonly movedShare: number;
  /** Cost of the new plan over that of one sought anew, changes themselves not priced. */
  readonly overFreePlan: number;
}

/** New readings have come for a share of the packs: each gets a new date within its life. */
function withNews(input: PlanInput, share: number, rng: Rng): [PlanInput, number] {
  let changed = 0;
  const packs = input.packs.map((pack) => {
    if (rng.unit() >= share) return pack;
    changed++;
    return { ...pack, life: lifeAround(rng.unit() * 700, 1000) };
  });
  return [{ ...input, packs }, changed];
}

const placed = (rounds: readonly PlannedRound[]) =>
  rounds.flatMap(({ technicianId, day, stops }) =>
    stops.map(({ siteId }) => ({ siteId, technicianId, day })),
  );

/** Plans, changes one pack in `1 / share`, plans again from the published rounds. */
export async function disturbanceRow(
  seed: number,
  assets: number,
  share: number,
): Promise<DisturbanceRow> {
  const input = fleetInput(assets, 2, seededRng(seed));
  const before = (await planFleet(input)).plan.rounds;
  const [news, changedPacks] = withNews(input, share, seededRng(seed + 1000));
  const informed = { ...news, known: knownOf(before) };
  const mended = await planFleet(informed);
  const free = await planFleet(informed, true);
  const after = mended.plan.rounds;
  const { moved, added, dropped } = planDifference(placed(before), placed(after));
  const visits = placed(before).length;
  return {
    ...{ seed, changedPacks, visits },
    ...{ moved: moved.length, added: added.length, dropped: dropped.length },
    movedShare: (moved.length + dropped.length) / visits,
    overFreePlan: mended.bareCost / free.bareCost - 1,
  };
}

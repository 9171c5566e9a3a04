import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import { type FinishedRow, listFinishedPacks } from "@/db/queries/outcomes";
import type { FleetPrior } from "@/lib/battery";
import { cohortPrior, devicePrior, type FinishedPack, learnCohorts } from "@/lib/battery";
import { groupBy } from "./forecast-input";

interface Member {
  readonly assetId: string;
  readonly deviceModelId: string;
  readonly cellTypeId: string;
  readonly climateId: string | null;
}

/** Packs alike: the same device model on the same cells in the same climate. */
function cohortOf(member: Member): string {
  return `${member.deviceModelId} ${member.cellTypeId} ${member.climateId ?? ""}`;
}

/**
 * What finished packs teach about these: learned from every pack of their device models that
 * came out. A pack of a cohort nobody has seen the end of gets none.
 */
export async function fleetPriors(
  db: Kysely<Database>,
  packs: readonly Member[],
): Promise<(pack: Member) => FleetPrior | null> {
  const models = [...new Set(packs.map((pack) => pack.deviceModelId))];
  const finished = (await listFinishedPacks(db, models)).map(finishedOf);
  const lives = new Map(learnCohorts(finished).map((life) => [life.cohort, life]));
  const ofDevice = groupBy(finished, (pack) => `${pack.deviceKey} ${pack.cohort}`);
  return (pack) => {
    const cohort = cohortOf(pack);
    const life = lives.get(cohort);
    if (!life) return null;
    const own = ofDevice.get(`${pack.assetId} ${cohort}`);
    return own ? devicePrior(life, own) : cohortPrior(life);
  };
}

function finishedOf(row: FinishedRow): FinishedPack {
  return {
    packKey: row.packId,
    deviceKey: row.assetId,
    cohort: cohortOf(row),
    lot: row.lotId,
    lifeRatio: row.days / (row.promisedDays ?? row.days),
    ranOut: !row.censored,
  };
}

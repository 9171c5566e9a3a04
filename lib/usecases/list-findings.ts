import { z } from "zod";
import { listFindingRows, listFindingsOfAsset } from "@/db/queries/findings";
import { getOrganisation } from "@/db/queries/organisation";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { defineUseCase } from "./use-case";

/** What the nightly look at the fleet found, with the packs concerned. */
export const listFindings = defineUseCase({
  name: "list-findings",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({}),
  async run(deps) {
    const organisation = await getOrganisation(deps.db);
    const findings = await listFindingRows(deps.db);
    return { organisation, findings, today: dayOfInstant(deps.now(), organisation.timeZone) };
  },
});
export type FindingsView = Awaited<ReturnType<typeof listFindings>>;

/** Open findings that concern the pack in one asset. */
export const listAssetFindings = defineUseCase({
  name: "list-asset-findings",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ assetId: z.uuid() }),
  run: (deps, _actor, { assetId }) => listFindingsOfAsset(deps.db, assetId),
});
export type AssetFindings = Awaited<ReturnType<typeof listAssetFindings>>;

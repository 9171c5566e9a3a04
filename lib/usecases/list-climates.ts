import { z } from "zod";
import { listClimatesWithSites } from "@/db/queries/climates";
import { getOrganisation } from "@/db/queries/organisation";
import { defineUseCase } from "./use-case";

/** The climates that sites follow: twelve monthly means each. */
export const listClimates = defineUseCase({
  name: "list-climates",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({}),
  async run(deps) {
    const [organisation, rows] = await Promise.all([
      getOrganisation(deps.db),
      listClimatesWithSites(deps.db),
    ]);
    return { organisation, rows };
  },
});

export type ClimateRow = Awaited<ReturnType<typeof listClimates>>["rows"][number];

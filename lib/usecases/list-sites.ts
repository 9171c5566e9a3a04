import { z } from "zod";
import { listCrewNames } from "@/db/queries/crew-names";
import { getOrganisation } from "@/db/queries/organisation";
import { countSites, listSites as query, SITE_ORDERS } from "@/db/queries/sites";
import { filterId, listEntries, PAGE_SIZE, pageWindow } from "./list-entries";
import { defineUseCase } from "./use-case";

export const siteListInput = z.object({
  ...listEntries,
  crewId: filterId,
  order: z.enum(SITE_ORDERS).catch("code"),
});

/** One page of sites. */
export const listSites = defineUseCase({
  name: "list-sites",
  allow: { roles: ["administrator", "dispatcher", "supervisor"], apiScope: "register:read" },
  input: siteListInput,
  run: async (deps, _actor, given) => {
    const [organisation, rows, total, crews] = await Promise.all([
      getOrganisation(deps.db),
      query(deps.db, { ...given, ...pageWindow(given.page) }),
      countSites(deps.db, given),
      listCrewNames(deps.db),
    ]);
    return { organisation, rows, total, crews, page: given.page, pageSize: PAGE_SIZE };
  },
});

export type SiteListView = Awaited<ReturnType<typeof listSites>>;

import { z } from "zod";
import { getOrganisation } from "@/db/queries/organisation";
import { listPeople as query, PEOPLE_ORDERS, PEOPLE_STATES } from "@/db/queries/people-directory";
import { filterWord, listEntries, PAGE_SIZE, pageWindow } from "./list-entries";
import { defineUseCase, ROLES } from "./use-case";

/** One page of the people of the organisation. */
export const listPeople = defineUseCase({
  name: "list-people",
  allow: { roles: ["administrator"] },
  input: z.object({
    ...listEntries,
    role: filterWord(ROLES),
    state: filterWord(PEOPLE_STATES),
    order: z.enum(PEOPLE_ORDERS).catch("name"),
  }),
  async run(deps, _actor, given) {
    const [organisation, found] = await Promise.all([
      getOrganisation(deps.db),
      query(deps.db, { ...given, ...pageWindow(given.page) }),
    ]);
    return { ...found, organisation, given, pageSize: PAGE_SIZE, now: deps.now() };
  },
});

export type PeopleView = Awaited<ReturnType<typeof listPeople>>;

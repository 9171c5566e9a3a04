import { z } from "zod";
import { listCrewsAndVans } from "@/db/queries/crews";
import { getOrganisation } from "@/db/queries/organisation";
import { listPeopleWithoutCrew, listTechnicians } from "@/db/queries/technicians";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { defineUseCase } from "./use-case";

/** Depots, crews, vans and technicians, with who could still become one. */
export const listCrews = defineUseCase({
  name: "list-crews",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({}),
  async run(deps) {
    const organisation = await getOrganisation(deps.db);
    const today = dayOfInstant(deps.now(), organisation.timeZone);
    const [structure, technicians, people] = await Promise.all([
      listCrewsAndVans(deps.db),
      listTechnicians(deps.db, today),
      listPeopleWithoutCrew(deps.db),
    ]);
    return { ...structure, technicians, people, organisation, today };
  },
});

export type CrewsView = Awaited<ReturnType<typeof listCrews>>;

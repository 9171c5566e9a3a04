import { z } from "zod";
import { listCrewsAndVans } from "@/db/queries/crews";
import { getOrganisation } from "@/db/queries/organisation";
import { findTechnician } from "@/db/queries/technicians";
import { notFound } from "@/lib/errors";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { defineUseCase } from "./use-case";

/** One technician with shifts, absences, and the crews and vans to choose from. */
export const readTechnician = defineUseCase({
  name: "read-technician",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ technicianId: z.string() }),
  async run(deps, _actor, { technicianId }) {
    const known = z.uuid().safeParse(technicianId).success;
    const technician = known ? await findTechnician(deps.db, technicianId) : null;
    if (!technician) throw notFound("This technician");
    const [organisation, { crews, vans }] = await Promise.all([
      getOrganisation(deps.db),
      listCrewsAndVans(deps.db),
    ]);
    const today = dayOfInstant(deps.now(), organisation.timeZone);
    return { technician, crews, vans, organisation, today };
  },
});

export type TechnicianView = Awaited<ReturnType<typeof readTechnician>>;

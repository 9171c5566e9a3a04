import { deleteTechnician, findTechnician } from "@/db/queries/technicians";
import { defineRemoval } from "./define-removal";

/** Takes a person out of the crews; their account stays. */
export const removeTechnician = defineRemoval({
  name: "remove-technician",
  subjectKind: "technician",
  what: "This technician",
  inUse:
    "Rounds in the record belong to this technician. Switch the person off instead; nothing is lost.",
  remove: async (trx, id) => {
    const technician = await findTechnician(trx, id);
    return technician && (await deleteTechnician(trx, id)) ? technician.name : null;
  },
});

import { deleteCrew } from "@/db/queries/crews";
import { defineRemoval } from "./define-removal";

/** Removes a crew without technicians, vans and sites. */
export const removeCrew = defineRemoval({
  name: "remove-crew",
  subjectKind: "crew",
  what: "This crew",
  inUse: "Technicians, vans or sites belong to this crew. Give them another one first.",
  remove: deleteCrew,
});

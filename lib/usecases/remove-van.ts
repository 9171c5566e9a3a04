import { deleteVan } from "@/db/queries/crews";
import { defineRemoval } from "./define-removal";

/** Removes a van that nobody drives and that never held a cell. */
export const removeVan = defineRemoval({
  name: "remove-van",
  subjectKind: "van",
  what: "This van",
  inUse: "A technician drives this van, or it has held cells, which stay in the record.",
  remove: deleteVan,
});

import { deleteClimate } from "@/db/queries/climates";
import { defineRemoval } from "./define-removal";

/** Removes a climate that no site follows. */
export const removeClimate = defineRemoval({
  name: "remove-climate",
  subjectKind: "climate",
  what: "This climate",
  inUse: "Sites follow this climate. Give them another one first.",
  remove: deleteClimate,
});

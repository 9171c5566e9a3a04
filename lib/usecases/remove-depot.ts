import { deleteDepot } from "@/db/queries/crews";
import { defineRemoval } from "./define-removal";

/** Removes a depot from which no crew starts and whose stores never held a cell. */
export const removeDepot = defineRemoval({
  name: "remove-depot",
  subjectKind: "depot",
  what: "This depot",
  inUse: "Crews start here, or its stores have held cells. Move the crews to another depot first.",
  remove: deleteDepot,
});

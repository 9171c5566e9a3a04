import { z } from "zod";
import { findPhoto } from "@/db/queries/photos";
import { forbidden, notFound } from "@/lib/errors";
import { type Actor, defineUseCase, type StoredObject } from "./use-case";

/** A photo as it is kept: the office sees all, a technician those they took. */
export const readPhoto = defineUseCase({
  name: "read-photo",
  allow: { roles: ["administrator", "dispatcher", "supervisor", "technician"] },
  input: z.object({ id: z.uuid() }),
  async run(deps, actor, { id }): Promise<StoredObject> {
    const photo = await findPhoto(deps.db, id);
    if (!photo) throw notFound("The photo");
    if (!isOffice(actor) && (actor.kind !== "person" || actor.personId !== photo.personId)) {
      throw forbidden("This photo was taken by somebody else.");
    }
    const found = await deps.storage?.get(photo.objectKey);
    if (!found) throw notFound("The photo");
    return found;
  },
});

function isOffice(actor: Actor): boolean {
  return actor.kind === "person" && actor.roles.some((role) => role !== "technician");
}

import { photosToSend } from "@/lib/sync/outbox-photos";
import type { FlushContext, FlushEnd } from "./flush";
import { allEntries } from "./outbox-store";
import { allPhotos, dropPhoto, notePhoto, readPicture } from "./photo-store";

/**
 * Sends the photos whose entries the server has, one at a time, until none is left or the signal
 * goes. A photo leaves the phone only when the server says that it has it.
 */
export async function flushPhotos(context: FlushContext): Promise<FlushEnd> {
  const { db, transport, personId, changed } = context;
  const photos = photosToSend(await allPhotos(db), await allEntries(db), personId);
  for (const photo of photos) {
    const bytes = await readPicture(db, photo.id);
    if (!bytes) {
      await dropPhoto(db, photo.id);
      continue;
    }
    const answer = await transport.sendPhoto(photo, bytes);
    if (answer.kind === "signed-out") return "signed-out";
    if (answer.kind === "cut") {
      await notePhoto(db, photo.id, null);
      return "again";
    }
    if (answer.kind === "good") await dropPhoto(db, photo.id);
    else await notePhoto(db, photo.id, { code: "invalid", message: answer.message, faults: [] });
    await changed();
  }
  return "sent";
}

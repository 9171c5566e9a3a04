import { flush, type FlushContext, type FlushEnd } from "./flush";
import { flushPhotos } from "./flush-photos";

/** Sends this person's entries, then the photos of those that are through. */
export async function flushAll(context: FlushContext): Promise<FlushEnd> {
  const end = await flush(context);
  if (end !== "sent" && end !== "again") return end;
  const photos = await flushPhotos(context);
  return photos === "sent" ? end : photos;
}

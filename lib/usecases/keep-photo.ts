import { getOrganisation } from "@/db/queries/organisation";
import { countPhotos, findPhoto, insertPhoto, placeOfEntry } from "@/db/queries/photos";
import { findSyncEntry } from "@/db/queries/sync-entries";
import { AppError, forbidden, invalid } from "@/lib/errors";
import { clockSkewMs, correctedInstant, recordedSkewMs } from "@/lib/sync/clock-skew";
import {
  MAX_PHOTO_BYTES,
  MAX_PHOTOS_AN_ENTRY,
  type PhotoRequest,
  photoRequest,
} from "@/lib/sync/photos";
import { type CleanImage, type Deps, defineUseCase, type PersonActor } from "./use-case";

export { MAX_PHOTO_BYTES };

/**
 * Takes a photo from a phone, once however often it is sent. What is kept is a picture made anew
 * from it; the file that was sent is thrown away.
 * @throws AppError unavailable (send it again later), invalid (it will never do), forbidden
 */
export const keepPhoto = defineUseCase({
  name: "keep-photo",
  allow: { roles: ["administrator", "dispatcher", "technician"] },
  input: photoRequest,
  async run(deps, actor, request): Promise<{ readonly id: string; readonly repeated: boolean }> {
    if (actor.kind !== "person" || request.personId !== actor.personId) {
      throw forbidden("This photo was taken by somebody else: they must sign in to send it.");
    }
    const known = await findPhoto(deps.db, request.id);
    if (known) return repeatOf(known, actor);
    const about = await entryOf(deps, actor, request.entryId);
    const image = await cleaned(deps, request.bytes);
    return store(deps, actor, { request, about, image });
  },
});

function repeatOf(known: { readonly id: string; readonly personId: string }, actor: PersonActor) {
  if (known.personId !== actor.personId) throw forbidden();
  return { id: known.id, repeated: true };
}

/** What the photo shows, from the entry it was taken for. */
async function entryOf(deps: Deps, actor: PersonActor, entryId: string) {
  const entry = await findSyncEntry(deps.db, entryId);
  if (!entry || entry.outcome === "refused") {
    throw new AppError("unavailable", "It waits for the entry it was taken for.");
  }
  if (entry.personId !== actor.personId) throw forbidden();
  if ((await countPhotos(deps.db, entryId)) >= MAX_PHOTOS_AN_ENTRY) {
    throw invalid(`An entry takes ${MAX_PHOTOS_AN_ENTRY} photos at most.`);
  }
  const { assetId = null, stopId = null } = entry.body as {
    readonly assetId?: string | null;
    readonly stopId?: string | null;
  };
  const place = await placeOfEntry(deps.db, { assetId, stopId });
  if (place) return place;
  throw invalid("What this photo shows is not in the register any more.");
}

async function cleaned(deps: Deps, bytes: Uint8Array): Promise<CleanImage> {
  if (bytes.length > MAX_PHOTO_BYTES) {
    throw invalid(`A photo may have ${MAX_PHOTO_BYTES / 1_000_000} MB at most.`);
  }
  if (!deps.cleanImage) throw new AppError("unavailable", "Photos are not taken here.");
  const result = await deps.cleanImage(bytes);
  if (result.ok) return result.image;
  throw invalid(result.reason, [{ field: "bytes", message: result.reason }]);
}

interface Order {
  readonly request: PhotoRequest;
  readonly about: { siteId: string; assetId: string | null; stopId: string | null };
  readonly image: CleanImage;
}

/** The picture is put away before its row is committed: no row ever points at nothing. */
async function store(deps: Deps, actor: PersonActor, { request, about, image }: Order) {
  const { storage } = deps;
  if (!storage) throw new AppError("unavailable", "Photos are not taken here.");
  const { id, entryId } = request;
  const receivedAt = deps.now();
  const skewMs = clockSkewMs(new Date(request.sentAt), receivedAt);
  const objectKey = `photos/${id.slice(0, 2)}/${id}.jpg`;
  const { width, height, bytes } = image;
  const { keepPhotoPosition } = await getOrganisation(deps.db);
  const position = keepPhotoPosition ? request.position : null;
  const fresh = await deps.db.transaction().execute(async (trx) => {
    const claimed = await insertPhoto(trx, {
      ...{ id, entryId, ...about, personId: actor.personId, receivedAt, objectKey },
      takenAt: correctedInstant(new Date(request.takenAt), skewMs, receivedAt),
      clockSkewMs: recordedSkewMs(skewMs),
      ...{ width, height, bytes: bytes.length },
      ...{ latitude: position?.latitude ?? null, longitude: position?.longitude ?? null },
    });
    if (claimed) await storage.put(objectKey, bytes, "image/jpeg");
    return claimed;
  });
  if (fresh) return { id, repeated: false };
  const known = await findPhoto(deps.db, id);
  if (!known) throw new AppError("unavailable", "The server had trouble with this photo.");
  return repeatOf(known, actor);
}

import type { Kysely, Transaction } from "kysely";
import type { Database } from "../client";

export interface NewPhoto {
  readonly id: string;
  readonly entryId: string;
  readonly personId: string;
  readonly siteId: string;
  readonly assetId: string | null;
  readonly stopId: string | null;
  readonly takenAt: Date;
  readonly receivedAt: Date;
  readonly clockSkewMs: number;
  readonly objectKey: string;
  readonly width: number;
  readonly height: number;
  readonly bytes: number;
  /** WGS 84 degrees; null: not known, or not to be kept. */
  readonly latitude: number | null;
  readonly longitude: number | null;
}

/**
 * Claims a photo's id. A second transaction with the same id waits here until the first is through,
 * then gets false.
 */
export async function insertPhoto(trx: Transaction<Database>, photo: NewPhoto): Promise<boolean> {
  const row = await trx
    .insertInto("photo")
    .values(photo)
    .onConflict((conflict) => conflict.column("id").doNothing())
    .returning("id")
    .executeTakeFirst();
  return row !== undefined;
}

export async function findPhoto(db: Kysely<Database>, id: string) {
  return db
    .selectFrom("photo")
    .select(["id", "personId", "objectKey"])
    .where("id", "=", id)
    .executeTakeFirst();
}

export async function countPhotos(db: Kysely<Database>, entryId: string): Promise<number> {
  const row = await db
    .selectFrom("photo")
    .select((eb) => eb.fn.countAll<number>().as("n"))
    .where("entryId", "=", entryId)
    .executeTakeFirstOrThrow();
  return row.n;
}

/** What an entry's photos show: the site, and the asset where it was about one. */
export async function placeOfEntry(
  db: Kysely<Database>,
  about: { readonly assetId: string | null; readonly stopId: string | null },
): Promise<{ siteId: string; assetId: string | null; stopId: string | null } | null> {
  const stop = about.stopId
    ? await db.selectFrom("stop").select("siteId").where("id", "=", about.stopId).executeTakeFirst()
    : undefined;
  const asset = about.assetId
    ? await db
        .selectFrom("asset")
        .select("siteId")
        .where("id", "=", about.assetId)
        .executeTakeFirst()
    : undefined;
  const siteId = asset?.siteId ?? stop?.siteId;
  if (!siteId) return null;
  return { siteId, assetId: about.assetId, stopId: stop ? about.stopId : null };
}

const MOST_SHOWN = 60;

/** Photos of an asset and of its site as a whole, newest first, with what was said there. */
export async function listAssetPhotos(
  db: Kysely<Database>,
  asset: { readonly id: string; readonly siteId: string },
) {
  return db
    .selectFrom("photo")
    .innerJoin("person", "person.id", "photo.personId")
    .innerJoin("syncEntry", "syncEntry.id", "photo.entryId")
    .select(["photo.id", "photo.takenAt", "photo.width", "photo.height", "photo.assetId"])
    .select(["photo.latitude", "photo.longitude"])
    .select(["photo.entryId", "person.name as personName", "syncEntry.kind", "syncEntry.body"])
    .where((eb) =>
      eb.or([
        eb("photo.assetId", "=", asset.id),
        eb.and([eb("photo.assetId", "is", null), eb("photo.siteId", "=", asset.siteId)]),
      ]),
    )
    .orderBy("photo.takenAt", "desc")
    .orderBy("photo.id")
    .limit(MOST_SHOWN)
    .execute();
}

/** The photos of these entries, in the order taken. */
export async function listEntryPhotos(db: Kysely<Database>, entryIds: readonly string[]) {
  if (entryIds.length === 0) return [];
  return db
    .selectFrom("photo")
    .select(["id", "entryId", "takenAt"])
    .where("entryId", "in", entryIds)
    .orderBy("takenAt")
    .execute();
}

import { type Kysely, sql, type Transaction } from "kysely";
import type { Database } from "../client";

export interface NewReading {
  readonly id: string;
  readonly packId: string;
  readonly at: Date;
  readonly millivolts: number;
  readonly kind: "resting" | "loaded";
  readonly loadUa: number | null;
  readonly temperatureDc: number | null;
  readonly accuracyMv: number | null;
  readonly instrument: string;
  readonly note: string;
  readonly doubt: string | null;
}

export interface ReadingOrigin {
  readonly source: "form" | "csv" | "api" | "phone";
  readonly personId: string | null;
  readonly apiKeyId: string | null;
  readonly receivedAt: Date;
}

/**
 * Inserts in one statement; an id that is there already is left as it is.
 * @returns the ids that were new
 */
export async function insertReadings(
  trx: Transaction<Database>,
  readings: readonly NewReading[],
  origin: ReadingOrigin,
): Promise<Set<string>> {
  if (readings.length === 0) return new Set();
  const rows = JSON.stringify(
    readings.map((r) => ({
      id: r.id,
      pack_id: r.packId,
      at: r.at,
      mv: r.millivolts,
      kind: r.kind,
      load_ua: r.loadUa,
      dc: r.temperatureDc,
      accuracy_mv: r.accuracyMv,
      instrument: r.instrument,
      note: r.note,
      doubt: r.doubt,
    })),
  );
  const result = await sql<{ id: string }>`
    insert into reading (id, pack_id, at, millivolts, kind, load_ua, temperature_dc, accuracy_mv,
      instrument, note, doubt, source, person_id, api_key_id, received_at)
    select r.id, r.pack_id, r.at, r.mv, r.kind, r.load_ua, r.dc, r.accuracy_mv, r.instrument, r.note,
      r.doubt, ${origin.source}, ${origin.personId}::uuid, ${origin.apiKeyId}::uuid,
      ${origin.receivedAt}::timestamptz
    from json_to_recordset(${rows}::json) as r(id uuid, pack_id uuid, at timestamptz, mv int, kind text,
      load_ua int, dc smallint, accuracy_mv smallint, instrument text, note text, doubt text)
    on conflict (id) do nothing
    returning id`.execute(trx);
  return new Set(result.rows.map((row) => row.id));
}

/** The pack a reading belongs to, or null when there is no such reading. */
export async function findReading(db: Kysely<Database>, readingId: string) {
  const row = await db
    .selectFrom("reading")
    .innerJoin("pack", "pack.id", "reading.packId")
    .innerJoin("asset", "asset.id", "pack.assetId")
    .select(["reading.id", "reading.packId", "reading.millivolts", "reading.at", "asset.tag"])
    .where("reading.id", "=", readingId)
    .executeTakeFirst();
  return row ?? null;
}

export interface NewVerdict {
  readonly id: string;
  readonly readingId: string;
  readonly verdict: "confirmed" | "set_aside" | "corrected";
  readonly correctedMv: number | null;
  readonly note: string;
  readonly personId: string;
  readonly at: Date;
}

/** @returns false when a verdict with this id exists already */
export async function insertVerdict(
  trx: Transaction<Database>,
  verdict: NewVerdict,
): Promise<boolean> {
  const row = await trx
    .insertInto("readingVerdict")
    .values(verdict)
    .onConflict((conflict) => conflict.column("id").doNothing())
    .returning("id")
    .executeTakeFirst();
  return row !== undefined;
}

/** Readings of one pack, oldest first, each with the verdict that stands. */
export async function listPackReadings(db: Kysely<Database>, packId: string) {
  return db
    .selectFrom("reading")
    .leftJoin("person", "person.id", "reading.personId")
    .leftJoin("apiKey", "apiKey.id", "reading.apiKeyId")
    .leftJoinLateral(
      (eb) =>
        eb
          .selectFrom("readingVerdict")
          .select(["verdict", "correctedMv", "note as verdictNote"])
          .whereRef("readingVerdict.readingId", "=", "reading.id")
          .orderBy("readingVerdict.at", "desc")
          .orderBy("readingVerdict.id")
          .limit(1)
          .as("standing"),
      (join) => join.onTrue(),
    )
    .select([
      "reading.id",
      "reading.at",
      "reading.millivolts",
      "reading.kind",
      "reading.loadUa",
      "reading.temperatureDc",
      "reading.accuracyMv",
      "reading.instrument",
      "reading.source",
      "reading.doubt",
      "reading.note",
      "person.name as personName",
      "apiKey.name as apiKeyName",
      "standing.verdict",
      "standing.correctedMv",
      "standing.verdictNote",
    ])
    .where("reading.packId", "=", packId)
    .orderBy("reading.at")
    .execute();
}

export type PackReadingRow = Awaited<ReturnType<typeof listPackReadings>>[number];

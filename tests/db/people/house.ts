import { randomUUID } from "node:crypto";
import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import { hashPassword } from "@/lib/usecases/passwords";
import type { Role, VisitorActor } from "@/lib/usecases/use-case";
import { actorWith } from "@/tests/support/deps";

export const PASSWORD = "fen sluice heron tide";
export const visitor: VisitorActor = { kind: "visitor", origin: "192.0.2.7" };

/** An organisation, as every use case expects one. */
export async function foundBoard(db: Kysely<Database>): Promise<void> {
  await db
    .insertInto("organisation")
    .values({
      name: "Quillmere Drainage Board",
      timeZone: "Europe/London",
      currency: "GBP",
      locale: "en-GB",
    })
    .execute();
}

let hashed: Promise<string> | null = null;

/** A person who has joined, with PASSWORD. */
export async function addPerson(db: Kysely<Database>, roles: readonly Role[], name = "Ada Marsh") {
  hashed ??= hashPassword(PASSWORD);
  const id = randomUUID();
  const email = `${id.slice(0, 8)}@quillmere.example`;
  await db
    .insertInto("person")
    .values({
      ...{ id, name, email, roles: [...roles] },
      ...{ passwordHash: await hashed, joinedAt: new Date("2026-11-01T09:00:00Z") },
    })
    .execute();
  return { id, email, actor: actorWith(roles, { personId: id, name, email }) };
}

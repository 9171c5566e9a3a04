import { randomUUID } from "node:crypto";
import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import type { Actor, Deps, JobName, MailMessage, PersonActor, Role } from "@/lib/usecases/use-case";

export interface TestDeps extends Deps {
  /** What was enqueued, in order. */
  readonly enqueued: { name: JobName; data: Record<string, unknown> }[];
  readonly sent: MailMessage[];
  /** Moves the clock. */
  setNow(now: Date): void;
}

/** Dependencies with a fixed clock, recorded jobs and recorded mail. */
export function testDeps(db: Kysely<Database>, now = new Date("2026-12-01T09:00:00Z")): TestDeps {
  let clock = now;
  const enqueued: TestDeps["enqueued"] = [];
  const sent: MailMessage[] = [];
  return {
    db,
    enqueued,
    sent,
    now: () => clock,
    setNow: (next) => {
      clock = next;
    },
    newId: randomUUID,
    appUrl: "https://wanewright.example",
    jobs: {
      enqueue: async (_db, name, data) => {
        enqueued.push({ name, data });
      },
    },
    mailer: {
      send: async (message) => {
        sent.push(message);
        return { ok: true, providerId: `test-${sent.length}` };
      },
    },
  };
}

export const systemActor: Actor = { kind: "system" };

/** A signed-in person with these roles; the row need not exist for read use cases. */
export function actorWith(roles: readonly Role[], more: Partial<PersonActor> = {}): PersonActor {
  return {
    kind: "person",
    personId: more.personId ?? randomUUID(),
    name: more.name ?? "Test Person",
    email: more.email ?? "test@quillmere.example",
    roles,
    technicianId: more.technicianId ?? null,
  };
}

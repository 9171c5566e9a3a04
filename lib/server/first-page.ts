import type { PersonActor } from "@/lib/usecases/use-case";

/** Where a person starts: on the phone when they are a technician and nothing else. */
export function firstPageOf(actor: Pick<PersonActor, "roles">): "/today" | "/horizon" {
  return actor.roles.every((role) => role === "technician") ? "/today" : "/horizon";
}

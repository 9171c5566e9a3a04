import { z } from "zod";
import { findPerson } from "@/db/queries/people-directory";
import { notFound } from "@/lib/errors";
import { defineUseCase } from "./use-case";

/** One person, for the form that changes them. */
export const readPerson = defineUseCase({
  name: "read-person",
  allow: { roles: ["administrator"] },
  input: z.object({ personId: z.string() }),
  async run(deps, _actor, { personId }) {
    const person = z.uuid().safeParse(personId).success
      ? await findPerson(deps.db, personId)
      : null;
    if (!person) throw notFound("This person");
    return person;
  },
});

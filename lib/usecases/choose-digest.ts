import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { listDigestChoices, saveDigestChoice } from "@/db/queries/digest-choices";
import { forbidden, notFound } from "@/lib/errors";
import { scaledEntry } from "./form-entries";
import { defineUseCase, personIdOf } from "./use-case";

/** Chooses weekdays, hour and horizon of a digest: one's own, or anybody's as administrator. */
export const chooseDigest = defineUseCase({
  name: "choose-digest",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({
    personId: z.uuid(),
    /** None: no digest. */
    weekdays: z
      .array(z.number().int().min(1).max(7))
      .transform((days) => [...new Set(days)].sort()),
    sendAt: z.string().regex(/^([01]\d|2[0-3]):[0-5]\d$/, "Enter a time as HH:MM, such as 07:00."),
    horizonDays: scaledEntry(0, { min: 1, max: 180, wanted: "a number of days" }),
  }),
  async run(deps, actor, choice) {
    const administers = actor.kind === "person" && actor.roles.includes("administrator");
    if (choice.personId !== personIdOf(actor) && !administers) throw forbidden();
    await deps.db.transaction().execute(async (trx) => {
      const [person] = await listDigestChoices(trx, choice.personId);
      if (!person) throw notFound("This person");
      await saveDigestChoice(trx, choice);
      const { personId, ...detail } = choice;
      await appendAudit(trx, {
        ...{ at: deps.now(), personId: personIdOf(actor), act: "choose-digest" },
        ...{ subjectKind: "person", subjectId: personId, detail },
      });
    });
  },
});

import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { upsertTechnician } from "@/db/queries/technicians";
import { mapDatabaseFault } from "./database-faults";
import { optionalId, requiredId } from "./form-entries";
import { TICKETS } from "./save-site";
import { defineUseCase, personIdOf } from "./use-case";

const clock = z.string().regex(/^([01]\d|2[0-3]):[0-5]\d(:00)?$/, "Enter a time as HH:MM.");

/** A time, or nothing. */
const optionalClock = z
  .union([z.literal("").transform(() => null), clock])
  .nullable()
  .default(null);

const shift = z
  .object({
    ...{ weekday: z.number().int().min(1).max(7), starts: clock, ends: clock },
    ...{ breakStarts: optionalClock, breakEnds: optionalClock },
  })
  .refine(({ starts, ends }) => ends > starts, {
    path: ["ends"],
    message: "A shift ends after it starts, on the same day.",
  })
  .refine(({ breakStarts, breakEnds }) => (breakStarts === null) === (breakEnds === null), {
    path: ["breakEnds"],
    message: "A break has a beginning and an end; leave both empty for none.",
  })
  .refine(isBreakWithin, {
    path: ["breakEnds"],
    message: "A break ends after it starts, within the shift.",
  });

function isBreakWithin(one: {
  readonly starts: string;
  readonly ends: string;
  readonly breakStarts: string | null;
  readonly breakEnds: string | null;
}): boolean {
  const { starts, ends, breakStarts, breakEnds } = one;
  if (breakStarts === null || breakEnds === null) return true;
  return starts <= breakStarts && breakStarts < breakEnds && breakEnds <= ends;
}

/** Makes a person a technician of a crew, or changes van, tickets and weekly shifts. */
export const saveTechnician = defineUseCase({
  name: "save-technician",
  allow: { roles: ["administrator"] },
  input: z.object({
    id: z.uuid(),
    personId: requiredId,
    crewId: requiredId,
    vanId: optionalId,
    tickets: z.array(z.enum(TICKETS)),
    shifts: z
      .array(shift)
      .max(7)
      .refine((all) => new Set(all.map((one) => one.weekday)).size === all.length, {
        message: "One shift a day.",
      }),
  }),
  run: (deps, actor, { shifts, ...technician }) =>
    mapDatabaseFault(() =>
      deps.db.transaction().execute(async (trx) => {
        await upsertTechnician(trx, technician, shifts);
        const { id, ...detail } = technician;
        await appendAudit(trx, {
          ...{ at: deps.now(), personId: personIdOf(actor), act: "save-technician" },
          ...{ subjectKind: "technician", subjectId: id, detail: { ...detail, shifts } },
        });
        return { technicianId: id };
      }),
    ),
});

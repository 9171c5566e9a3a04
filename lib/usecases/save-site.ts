import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { listCrewNames } from "@/db/queries/crew-names";
import { findSite, listClimates, saveSiteRecord } from "@/db/queries/sites";
import { notFound } from "@/lib/errors";
import { mapDatabaseFault } from "./database-faults";
import { optionalId, optionalTextEntry, scaledEntry, textEntry } from "./form-entries";
import { defineUseCase, personIdOf } from "./use-case";

export const HAZARDS = [
  "water",
  "height",
  "confined_space",
  "roadside",
  "explosive_atmosphere",
  "lone_working",
  "livestock",
  "soft_ground",
] as const;
export const TICKETS = [
  "height",
  "boat",
  "confined_space",
  "roadside",
  "explosive_atmosphere",
] as const;

const monthDay = z
  .string()
  .regex(/^(0[1-9]|1[0-2])-([0-2][0-9]|3[01])$/, "Month and day as MM-DD, such as 04-15.");
const clock = z
  .union([z.string().regex(/^([01]\d|2[0-3]):[0-5]\d/, "A time as HH:MM."), z.literal("")])
  .nullish()
  .transform((value) => value || null);
const orNull = (longest: number) => optionalTextEntry(longest).transform((value) => value || null);
const degrees = (limit: number, wanted: string) =>
  scaledEntry(7, { min: -limit * 1e7, max: limit * 1e7, wanted }).transform((v) => v / 1e7);

const input = z
  .object({
    id: z.uuid(),
    code: textEntry("a short code", 100),
    name: textEntry("a name"),
    latitude: degrees(90, "degrees north, such as 52.51234"),
    longitude: degrees(180, "degrees east, such as 0.12345"),
    crewId: optionalId,
    climateId: optionalId,
    noticeDays: scaledEntry(0, { min: 0, max: 120, wanted: "a number of days" }),
    opens: clock,
    closes: clock,
    keyCode: orNull(100),
    contactName: orNull(200),
    contactEmail: orNull(200),
    contactPhone: orNull(100),
    hazards: z.array(z.enum(HAZARDS)).default([]),
    tickets: z.array(z.enum(TICKETS)).default([]),
    driveUpNotes: optionalTextEntry(),
    closures: z
      .array(
        z.object({
          firstMonthDay: monthDay,
          lastMonthDay: monthDay,
          reason: optionalTextEntry(200),
        }),
      )
      .max(20)
      .default([]),
  })
  .refine((site) => (site.opens === null) === (site.closes === null), {
    path: ["closes"],
    message: "Enter both hours, or neither.",
  })
  .refine((site) => !site.opens || !site.closes || site.closes > site.opens, {
    path: ["closes"],
    message: "It closes after it opens.",
  });

/** Adds a site or changes it, with its closed seasons. */
export const saveSite = defineUseCase({
  name: "save-site",
  allow: { roles: ["administrator", "dispatcher"] },
  input,
  run: async (deps, actor, { closures, ...given }): Promise<{ readonly code: string }> => {
    const at = deps.now();
    await deps.db.transaction().execute(async (trx) => {
      await mapDatabaseFault(() =>
        saveSiteRecord(
          trx,
          { ...given, updatedAt: at },
          closures.map((closure) => ({ ...closure, id: deps.newId() })),
        ),
      );
      await appendAudit(trx, {
        ...{ at, personId: personIdOf(actor), act: "save-site" },
        ...{ subjectKind: "site", subjectId: given.id, detail: { code: given.code } },
      });
    });
    return { code: given.code };
  },
});

/** What the site form needs: the site (null: a new one), crews and climates. */
export const readSiteForm = defineUseCase({
  name: "read-site-form",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ code: z.string().nullable() }),
  run: async (deps, _actor, { code }) => {
    const site = code === null ? null : await findSite(deps.db, code);
    if (code !== null && !site) throw notFound(`The site ${code}`);
    const [crews, climates] = await Promise.all([listCrewNames(deps.db), listClimates(deps.db)]);
    return { site, crews, climates };
  },
});

export type SiteFormView = Awaited<ReturnType<typeof readSiteForm>>;

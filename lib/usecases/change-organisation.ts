import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { getOrganisation, updateOrganisation } from "@/db/queries/organisation";
import { readScaled } from "@/lib/csv/read-scaled";
import { scaledEntry, textEntry } from "./form-entries";
import * as fields from "./organisation-fields";
import { defineUseCase, personIdOf } from "./use-case";

const input = z
  .object({
    name: textEntry("the organisation's name", 120),
    timeZone: fields.timeZoneEntry,
    locale: fields.localeEntry,
    currency: fields.currencyEntry,
    workingDays: z
      .array(z.number().int().min(1).max(7))
      .min(1, "Choose at least one working day.")
      .transform((days) => [...new Set(days)].sort()),
    crewCostPerHour: z.string(),
    overtimeCostPerHour: z.string(),
    travelCostPerKm: z.string(),
    detourFactor: scaledEntry(2, { min: 100, max: 500, wanted: "a factor such as 1.3" }),
    roadSpeedKmh: scaledEntry(0, { min: 5, max: 130, wanted: "a speed" }),
    travelTableUrl: fields.serviceUrlEntry,
    mapTileUrl: fields.tileUrlEntry,
    keepPhotoPosition: z.boolean(),
  })
  .transform(({ crewCostPerHour, overtimeCostPerHour, travelCostPerKm, ...rest }, context) => {
    const digits = fields.minorDigits(rest.currency);
    const money = (field: string, text: string) => {
      const minor = readScaled(text, "either", digits);
      if (minor !== null && minor >= 0 && minor < 1e9) return minor;
      const message = `Enter an amount in ${rest.currency}, such as 38.`;
      context.addIssue({ code: "custom", path: [field], message });
      return 0;
    };
    return {
      ...rest,
      detourFactor: rest.detourFactor / 100,
      crewCostMinorPerHour: money("crewCostPerHour", crewCostPerHour),
      overtimeCostMinorPerHour: money("overtimeCostPerHour", overtimeCostPerHour),
      travelCostMinorPerKm: money("travelCostPerKm", travelCostPerKm),
    };
  });

/** Changes how the organisation writes, works and reckons. */
export const changeOrganisation = defineUseCase({
  name: "change-organisation",
  allow: { roles: ["administrator"] },
  input,
  run: (deps, actor, change) =>
    deps.db.transaction().execute(async (trx) => {
      const before = await getOrganisation(trx);
      await updateOrganisation(trx, change);
      await appendAudit(trx, {
        ...{ at: deps.now(), personId: personIdOf(actor), act: "change-organisation" },
        ...{ subjectKind: "organisation", subjectId: null },
        detail: { changed: differences(before, change) },
      });
    }),
});

function differences(before: object, after: object): Record<string, unknown> {
  const old = new Map<string, unknown>(Object.entries(before));
  const changed = Object.entries(after).filter(
    ([key, value]) => JSON.stringify(old.get(key)) !== JSON.stringify(value),
  );
  return Object.fromEntries(changed.map(([key, value]) => [key, [old.get(key) ?? null, value]]));
}

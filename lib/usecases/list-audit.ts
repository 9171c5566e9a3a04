import { z } from "zod";
import { auditChoices, listAudit as query } from "@/db/queries/audit-log";
import { getOrganisation } from "@/db/queries/organisation";
import { filterId, listEntries, PAGE_SIZE, pageWindow } from "./list-entries";
import { defineUseCase } from "./use-case";

const day = z
  .string()
  .regex(/^\d{4}-(0[1-9]|1[0-2])-(0[1-9]|[12]\d|3[01])$/)
  .refine((text) => new Date(`${text}T00:00:00Z`).toISOString().startsWith(text))
  .nullable()
  .catch(null);

/** One page of who did what. */
export const listAudit = defineUseCase({
  name: "list-audit",
  allow: { roles: ["administrator", "supervisor"] },
  input: z.object({
    page: listEntries.page,
    act: z.string().min(1).max(100).nullable().catch(null),
    personId: filterId,
    fromDay: day,
    toDay: day,
  }),
  async run(deps, _actor, given) {
    const organisation = await getOrganisation(deps.db);
    const { timeZone } = organisation;
    const [found, choices] = await Promise.all([
      query(deps.db, { ...given, timeZone, ...pageWindow(given.page) }),
      auditChoices(deps.db),
    ]);
    return { ...found, ...choices, organisation, given, pageSize: PAGE_SIZE, now: deps.now() };
  },
});

export type AuditView = Awaited<ReturnType<typeof listAudit>>;

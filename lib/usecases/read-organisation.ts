import { z } from "zod";
import { getOrganisation } from "@/db/queries/organisation";
import { defineUseCase, ROLES } from "./use-case";

/** The organisation: how it writes (time zone, locale, currency), works and reckons. */
export const readOrganisation = defineUseCase({
  name: "read-organisation",
  allow: { roles: ROLES, system: true },
  input: z.object({}),
  run: (deps) => getOrganisation(deps.db),
});

export type OrganisationView = Awaited<ReturnType<typeof readOrganisation>>;

import { z } from "zod";
import { getOrganisation } from "@/db/queries/organisation";
import { policyComparison } from "@/lib/present/policy-comparison";
import { policyRecord } from "@/lib/present/policy-record";
import { defineUseCase } from "./use-case";

/** Ways to decide when a pack is swapped, as last measured on simulated years. */
export const readPolicies = defineUseCase({
  name: "read-policies",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({}),
  async run(deps) {
    const { locale } = await getOrganisation(deps.db);
    return { locale, record: policyRecord, comparison: policyComparison(policyRecord, locale) };
  },
});
export type PoliciesView = Awaited<ReturnType<typeof readPolicies>>;

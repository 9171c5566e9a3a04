import { z } from "zod";
import { schemaVersion } from "@/db/queries/schema-version";
import { defineUseCase } from "./use-case";

/** Whether this process can work: the database answers and has a schema. */
export const readHealth = defineUseCase({
  name: "read-health",
  allow: { system: true },
  input: z.object({}),
  async run(deps) {
    const schema = await schemaVersion(deps.db);
    return { ok: schema !== null, database: "reachable" as const, schema };
  },
});

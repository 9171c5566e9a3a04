import { z } from "zod";
import { revokeApiKey as revoke } from "@/db/queries/api-keys";
import { appendAudit } from "@/db/queries/audit";
import { notFound } from "@/lib/errors";
import { defineUseCase, personIdOf } from "./use-case";

/** Ends an API key at its next request; it cannot be taken back into use. */
export const revokeApiKey = defineUseCase({
  name: "revoke-api-key",
  allow: { roles: ["administrator"] },
  input: z.object({ apiKeyId: z.uuid() }),
  run: (deps, actor, { apiKeyId }) =>
    deps.db.transaction().execute(async (trx) => {
      const at = deps.now();
      const name = await revoke(trx, apiKeyId, at);
      if (name === null) throw notFound("This API key");
      await appendAudit(trx, {
        ...{ at, personId: personIdOf(actor), act: "revoke-api-key" },
        ...{ subjectKind: "api_key", subjectId: apiKeyId, detail: { name } },
      });
    }),
});

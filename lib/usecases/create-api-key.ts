import { z } from "zod";
import { insertApiKey } from "@/db/queries/api-keys";
import { appendAudit } from "@/db/queries/audit";
import { textEntry } from "./form-entries";
import { hashOfSecret, newSecret } from "./one-time-secret";
import { defineUseCase, personIdOf } from "./use-case";

export const API_SCOPES = ["readings:write", "register:read"] as const;
/** Long enough to tell keys apart in a list, too short to help anybody guess one. */
const PREFIX_LENGTH = 10;

/** Makes an API key. The secret is in the answer and nowhere else: only its hash is kept. */
export const createApiKey = defineUseCase({
  name: "create-api-key",
  allow: { roles: ["administrator"] },
  input: z.object({
    name: textEntry("what the key is for", 100),
    scopes: z.array(z.enum(API_SCOPES)).min(1, "Choose at least one right."),
  }),
  async run(deps, actor, { name, scopes }): Promise<{ name: string; secret: string }> {
    const secret = `wane_${newSecret(deps)}`;
    const id = deps.newId();
    const createdAt = deps.now();
    const createdBy = personIdOf(actor);
    await deps.db.transaction().execute(async (trx) => {
      await insertApiKey(trx, {
        ...{ id, name, scopes, createdBy, createdAt },
        prefix: secret.slice(0, PREFIX_LENGTH),
        keyHash: hashOfSecret(secret),
      });
      await appendAudit(trx, {
        ...{ at: createdAt, personId: createdBy, act: "create-api-key" },
        ...{ subjectKind: "api_key", subjectId: id, detail: { name, scopes } },
      });
    });
    return { name, secret };
  },
});

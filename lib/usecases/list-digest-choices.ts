import { z } from "zod";
import { listDigestChoices as query } from "@/db/queries/digest-choices";
import { getOrganisation } from "@/db/queries/organisation";
import { defineUseCase } from "./use-case";

/** The digests: an administrator sees everybody's, others their own. */
export const listDigestChoices = defineUseCase({
  name: "list-digest-choices",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({}),
  async run(deps, actor) {
    const own = actor.kind === "person" && !actor.roles.includes("administrator");
    const [organisation, rows] = await Promise.all([
      getOrganisation(deps.db),
      query(deps.db, own ? actor.personId : null),
    ]);
    return { organisation, rows, now: deps.now() };
  },
});

export type DigestRow = Awaited<ReturnType<typeof listDigestChoices>>["rows"][number];

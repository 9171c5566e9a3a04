import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import { lockFinding, packsOfModel, setDismissal } from "@/db/queries/findings";
import { forbidden, notFound } from "@/lib/errors";
import { textEntry } from "./form-entries";
import { touchForecasts } from "./touch-forecasts";
import { type Actor, type Deps, defineUseCase, personIdOf } from "./use-case";

interface Settled {
  /** Whom it was about: a lot's code or a device model's name. */
  readonly about: string;
}

/** Puts a finding aside with a reason; it stays in the list and can be opened again. */
export const dismissFinding = defineUseCase({
  name: "dismiss-finding",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({
    id: z.uuid(),
    because: textEntry("why it needs nothing more", 500),
  }),
  run: (deps, actor, { id, because }) => settle(deps, actor, { id, because }),
});

/** Opens a dismissed finding again. */
export const reopenFinding = defineUseCase({
  name: "reopen-finding",
  allow: { roles: ["administrator", "dispatcher"] },
  input: z.object({ id: z.uuid() }),
  run: (deps, actor, { id }) => settle(deps, actor, { id, because: null }),
});

async function settle(
  deps: Deps,
  actor: Actor,
  { id, because }: { readonly id: string; readonly because: string | null },
): Promise<Settled> {
  const by = personIdOf(actor);
  if (!by) throw forbidden();
  const at = deps.now();
  return deps.db.transaction().execute(async (trx) => {
    const finding = await lockFinding(trx, id);
    if (!finding) throw notFound("The finding");
    const about = finding.lotCode ?? finding.modelName ?? "";
    await setDismissal(trx, id, because === null ? null : { at, by, because });
    if (finding.deviceModelId) {
      // a shift of the draw bears on forecasts while it is open
      await touchForecasts(trx, deps, await packsOfModel(trx, finding.deviceModelId));
    }
    await appendAudit(trx, {
      ...{ at, personId: by, act: because === null ? "reopen-finding" : "dismiss-finding" },
      ...{ subjectKind: "finding", subjectId: id },
      detail: { kind: finding.kind, about, because },
    });
    return { about };
  });
}

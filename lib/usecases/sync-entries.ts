import { findSyncEntry, insertSyncEntry, type NewSyncEntry } from "@/db/queries/sync-entries";
import { AppError, forbidden, isAppError } from "@/lib/errors";
import {
  entryBody,
  type EntryBody,
  type EntryOutcome,
  type Refusal,
  syncRequest,
  type SyncRequest,
  type SyncResponse,
} from "@/lib/sync/entries";
import { applyEntry } from "./apply-entry";
import { type Deps, defineUseCase, type PersonActor } from "./use-case";

type Envelope = SyncRequest["entries"][number];

/** A refusal that waiting cannot mend is recorded; these may go through when sent again. */
const TRY_AGAIN = new Set(["unavailable", "too_many", "not_signed_in"]);

/**
 * Takes what a phone kept. Each entry is applied once, in its own transaction, in the order
 * given; one that is refused does not block the others and comes back with its reason.
 */
export const syncEntries = defineUseCase({
  name: "sync-entries",
  allow: { roles: ["administrator", "dispatcher", "technician"] },
  input: syncRequest,
  async run(deps, actor, request): Promise<SyncResponse> {
    if (actor.kind !== "person") throw forbidden();
    const receivedAt = deps.now();
    const outcomes: EntryOutcome[] = [];
    for (const envelope of request.entries) {
      outcomes.push(await takeEntry(deps, actor, request, envelope, receivedAt));
    }
    return { receivedAt: receivedAt.toISOString(), outcomes };
  },
});

async function takeEntry(
  deps: Deps,
  actor: PersonActor,
  request: SyncRequest,
  envelope: Envelope,
  receivedAt: Date,
): Promise<EntryOutcome> {
  if (envelope.personId !== actor.personId) {
    return refused(envelope.id, {
      code: "forbidden",
      message: "This entry was made by somebody else on this phone: they must sign in to send it.",
      faults: [],
    });
  }
  const parsed = entryBody.safeParse(envelope.body);
  const record: NewSyncEntry = {
    id: envelope.id,
    personId: actor.personId,
    deviceId: request.deviceId,
    kind: parsed.success ? parsed.data.kind : "unknown",
    happenedAt: new Date(envelope.happenedAt),
    receivedAt,
    clockSkewMs: skewOf(request, receivedAt),
    body: envelope.body,
    outcome: "applied",
    refusal: null,
  };
  if (!parsed.success) {
    const faults = parsed.error.issues.map((i) => ({
      field: i.path.join("."),
      message: i.message,
    }));
    const message = "This entry could not be read. Enter it again.";
    return recordRefusal(deps, record, { code: "invalid", message, faults });
  }
  return applyOnce(deps, actor, record, parsed.data);
}

/** A clock that is off by more than three weeks is said to be off by three weeks. */
function skewOf(request: SyncRequest, receivedAt: Date): number {
  const skew = new Date(request.sentAt).getTime() - receivedAt.getTime();
  const most = 21 * 86_400_000;
  return Math.max(-most, Math.min(most, skew));
}

async function applyOnce(
  deps: Deps,
  actor: PersonActor,
  record: NewSyncEntry,
  body: EntryBody,
): Promise<EntryOutcome> {
  try {
    const fresh = await deps.db.transaction().execute(async (trx) => {
      if (!(await insertSyncEntry(trx, record))) return false;
      await applyEntry(trx, deps, actor, {
        id: record.id,
        happenedAt: record.happenedAt,
        body,
      });
      return true;
    });
    return fresh
      ? { id: record.id, outcome: "applied", refusal: null }
      : await recordedOutcome(deps, actor, record.id);
  } catch (error) {
    if (!isAppError(error) || TRY_AGAIN.has(error.code)) throw error;
    return recordRefusal(deps, record, refusalOf(error));
  }
}

async function recordRefusal(
  deps: Deps,
  record: NewSyncEntry,
  refusal: Refusal,
): Promise<EntryOutcome> {
  await deps.db
    .transaction()
    .execute((trx) => insertSyncEntry(trx, { ...record, outcome: "refused", refusal }));
  return refused(record.id, refusal);
}

/** What became of an entry when it was first sent. */
async function recordedOutcome(deps: Deps, actor: PersonActor, id: string): Promise<EntryOutcome> {
  const row = await findSyncEntry(deps.db, id);
  if (!row || row.personId !== actor.personId) {
    throw new AppError("conflict", "An entry with this id was sent by somebody else.");
  }
  if (row.outcome === "applied") return { id, outcome: "applied", refusal: null };
  return refused(id, row.refusal as unknown as Refusal);
}

function refusalOf(error: AppError): Refusal {
  return { code: error.code, message: error.message, faults: error.faults };
}

function refused(id: string, refusal: Refusal): EntryOutcome {
  return { id, outcome: "refused", refusal };
}

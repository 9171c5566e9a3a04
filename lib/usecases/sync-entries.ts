import { z } from "zod";
import { closeMatterOfEntry, raiseMatter } from "@/db/queries/field-matters";
import { findSyncEntry, insertSyncEntry, type NewSyncEntry } from "@/db/queries/sync-entries";
import { forbidden, isAppError } from "@/lib/errors";
import { clockSkewMs, correctedInstant, recordedSkewMs } from "@/lib/sync/clock-skew";
import {
  type EntryBody,
  entryBody,
  type EntryOutcome,
  NOT_YOURS,
  type Refusal,
  type SyncRequest,
  syncRequest,
  type SyncResponse,
} from "@/lib/sync/entries";
import { subjectOf } from "@/lib/sync/entry-order";
import { applyEntry } from "./apply-entry";
import { brokenRule } from "./broken-rule";
import { storableJson } from "./storable-json";
import { type Deps, defineUseCase, type PersonActor } from "./use-case";

type Envelope = SyncRequest["entries"][number];

interface Call {
  readonly deps: Deps;
  readonly actor: PersonActor;
  readonly deviceId: string;
  readonly receivedAt: Date;
  readonly skewMs: number;
  /** Failures that nobody expected, for the log. */
  readonly troubles: unknown[];
}

export interface SyncResult {
  readonly response: SyncResponse;
  readonly troubles: readonly unknown[];
}

/** A refusal that waiting cannot mend is recorded; these may go through when sent again. */
const TRY_AGAIN = new Set(["unavailable", "too_many", "not_signed_in"]);
/** Two people's words against each other: the office decides. */
const TO_DECIDE = new Set(["conflict", "forbidden", "not_found"]);
const WAITS = "It waits for an earlier entry about the same thing.";

/**
 * Takes what a phone kept. Each entry is applied once, in its own transaction, in the order
 * given; one that is refused does not block the others and comes back with its reason. One
 * that must wait holds up only the later entries about the same asset, stop or round.
 */
export const syncEntries = defineUseCase({
  name: "sync-entries",
  allow: { roles: ["administrator", "dispatcher", "technician"] },
  input: syncRequest,
  async run(deps, actor, request): Promise<SyncResult> {
    if (actor.kind !== "person") throw forbidden();
    const receivedAt = deps.now();
    const skewMs = clockSkewMs(new Date(request.sentAt), receivedAt);
    const { deviceId } = request;
    const call: Call = { deps, actor, deviceId, receivedAt, skewMs, troubles: [] };
    const outcomes: EntryOutcome[] = [];
    const waiting = new Set<string>();
    for (const envelope of request.entries) {
      const subject = subjectOf(envelope.body);
      const outcome =
        subject && waiting.has(subject)
          ? later(envelope.id, WAITS)
          : await takeEntry(call, envelope);
      if (subject && outcome.outcome === "later") waiting.add(subject);
      outcomes.push(outcome);
    }
    const { personId } = actor;
    const times = { receivedAt: receivedAt.toISOString(), answeredAt: deps.now().toISOString() };
    const response = { ...times, personId, outcomes };
    return { response, troubles: call.troubles };
  },
});

async function takeEntry(call: Call, envelope: Envelope): Promise<EntryOutcome> {
  if (envelope.personId !== call.actor.personId) return notYours(envelope.id);
  const parsed = entryBody.safeParse(envelope.body);
  const record: NewSyncEntry = {
    id: envelope.id,
    personId: call.actor.personId,
    deviceId: call.deviceId,
    kind: parsed.success ? parsed.data.kind : "unknown",
    happenedAt: new Date(envelope.happenedAt),
    receivedAt: call.receivedAt,
    clockSkewMs: recordedSkewMs(call.skewMs),
    body: parsed.success ? parsed.data : storableJson(envelope.body),
    outcome: "applied",
    refusal: null,
  };
  if (parsed.success) return applyOnce(call, record, { mends: envelope.mends, body: parsed.data });
  const faults = parsed.error.issues.map((i) => ({ field: i.path.join("."), message: i.message }));
  const message = "This entry could not be read. Enter it again.";
  return recordRefusal(call, record, { code: "invalid", message, faults });
}

async function applyOnce(
  call: Call,
  record: NewSyncEntry,
  { body, mends }: { readonly body: EntryBody; readonly mends: string | null },
): Promise<EntryOutcome> {
  const { deps, actor, receivedAt, skewMs } = call;
  try {
    const fresh = await deps.db.transaction().execute(async (trx) => {
      if (!(await insertSyncEntry(trx, record))) return false;
      await applyEntry(trx, deps, actor, {
        id: record.id,
        happenedAt: correctedInstant(record.happenedAt, skewMs, receivedAt),
        body,
      });
      const { personId } = actor;
      if (mends) await closeMatterOfEntry(trx, { entryId: mends, personId }, mendedBy(call));
      return true;
    });
    return fresh
      ? { id: record.id, outcome: "applied", refusal: null }
      : await recordedOutcome(call, record.id);
  } catch (error) {
    const broken = isAppError(error) ? error : brokenRule(error);
    if (broken && !TRY_AGAIN.has(broken.code)) {
      const { code, message, faults } = broken;
      return recordRefusal(call, record, { code, message, faults });
    }
    if (!broken) call.troubles.push(error);
    // A defect or a lost connection: nothing of the entry remains, and it does not block others.
    return later(record.id, broken?.message ?? "The server had trouble with this entry.");
  }
}

function mendedBy({ deps, actor }: Call) {
  const closedBy = actor.personId;
  return { closedAt: deps.now(), closedBy, outcome: "mended" as const, note: "" };
}

/** Between the failed attempt and this, another request may have applied the entry: it counts. */
async function recordRefusal(
  call: Call,
  record: NewSyncEntry,
  refusal: Refusal,
): Promise<EntryOutcome> {
  const { deps, actor } = call;
  const recorded = await deps.db.transaction().execute(async (trx) => {
    if (!(await insertSyncEntry(trx, { ...record, outcome: "refused", refusal }))) return false;
    await raiseMatter(trx, {
      ...{ id: deps.newId(), entryId: record.id, personId: actor.personId },
      kind: TO_DECIDE.has(refusal.code) ? "conflict" : "refused",
      ...{ ...aboutOf(record.body), raisedAt: deps.now(), detail: { kind: record.kind } },
    });
    return true;
  });
  return recorded ? refused(record.id, refusal) : recordedOutcome(call, record.id);
}

/** What a refused entry spoke of, as far as it can be read. */
function aboutOf(body: unknown) {
  const { assetId, stopId, roundId } = (body ?? {}) as Record<string, unknown>;
  const id = (value: unknown) => (z.uuid().safeParse(value).success ? String(value) : null);
  return { assetId: id(assetId), stopId: id(stopId), roundId: id(roundId) };
}

/** What became of an entry when it was first sent. */
async function recordedOutcome(call: Call, id: string): Promise<EntryOutcome> {
  const row = await findSyncEntry(call.deps.db, id);
  if (!row) return later(id, "The server had trouble with this entry.");
  if (row.personId !== call.actor.personId) return notYours(id);
  if (row.outcome === "applied") return { id, outcome: "applied", refusal: null };
  return refused(id, row.refusal as unknown as Refusal);
}

function notYours(id: string): EntryOutcome {
  const message =
    "This entry was made by somebody else on this phone: they must sign in to send it.";
  return refused(id, { code: NOT_YOURS, message, faults: [] });
}

function later(id: string, message: string): EntryOutcome {
  return { id, outcome: "later", refusal: { code: "unavailable", message, faults: [] } };
}

function refused(id: string, refusal: Refusal): EntryOutcome {
  return { id, outcome: "refused", refusal };
}

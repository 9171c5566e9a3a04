import type { EntryOutcome } from "@/lib/sync/entries";
import { subjectOf } from "@/lib/sync/entry-order";
import { ENTRIES_A_CALL, type OutboxEntry } from "@/lib/sync/outbox";
import type { FieldDatabase } from "./database";
import { releaseEntries, settleEntries, takeBatch } from "./outbox-store";
import type { Transport } from "./transport";

/**
 * How sending ended. `sent`: nothing that could go is left. `again`: try later (no signal, or
 * something waits). `other-person`: somebody else is signed in now.
 */
export type FlushEnd = "sent" | "again" | "signed-out" | "other-person";

export interface FlushContext {
  readonly db: FieldDatabase;
  readonly transport: Transport;
  readonly deviceId: string;
  readonly personId: string;
  /** Called after each change of the outbox. */
  readonly changed: () => Promise<void>;
}

/**
 * Sends this person's entries in order until none is left or the signal goes. The caller holds
 * the lock that keeps other tabs from sending meanwhile: what is marked as being sent when this
 * begins was left behind by a page that was killed.
 */
export async function flush(context: FlushContext): Promise<FlushEnd> {
  const { db, personId, changed } = context;
  const waiting = new Set<string>();
  let most = ENTRIES_A_CALL;
  await releaseEntries(db);
  for (;;) {
    const batch = await takeBatch(db, personId, waiting, most);
    if (batch.length === 0) return waiting.size > 0 ? "again" : "sent";
    await changed();
    const step = await sendBatch(context, batch);
    await releaseEntries(db);
    await changed();
    if (step.kind === "end") return step.end;
    if (step.kind === "smaller") most = Math.max(1, Math.floor(batch.length / 2));
    else for (const subject of step.waiting) waiting.add(subject);
  }
}

type Step =
  | { readonly kind: "end"; readonly end: FlushEnd }
  | { readonly kind: "smaller" }
  | { readonly kind: "next"; readonly waiting: readonly string[] };

async function sendBatch(context: FlushContext, batch: readonly OutboxEntry[]): Promise<Step> {
  const { db, transport, deviceId, personId } = context;
  const answer = await transport.send(deviceId, batch);
  switch (answer.kind) {
    case "cut":
      return { kind: "end", end: "again" };
    case "signed-out":
      return { kind: "end", end: "signed-out" };
    case "refused":
      return refuseWhole(context, batch, answer.message);
    case "good": {
      const { outcomes, answeredAt } = answer.value;
      await settleEntries(db, outcomes, answeredAt);
      if (answer.value.personId !== personId) return { kind: "end", end: "other-person" };
      return { kind: "next", waiting: subjectsThatWait(batch, outcomes) };
    }
  }
}

/** A request that the server will not have: halves find the entry at fault, which is refused. */
async function refuseWhole(
  { db }: FlushContext,
  batch: readonly OutboxEntry[],
  message: string,
): Promise<Step> {
  const only = batch[0];
  if (batch.length !== 1 || !only) return { kind: "smaller" };
  const refusal = { code: "invalid", message, faults: [] };
  await settleEntries(db, [{ id: only.id, outcome: "refused", refusal }], "");
  return { kind: "next", waiting: [] };
}

/** What was put off, or not answered at all, holds up what is about the same thing. */
function subjectsThatWait(
  batch: readonly OutboxEntry[],
  outcomes: readonly EntryOutcome[],
): string[] {
  const through = new Set(outcomes.filter((o) => o.outcome !== "later").map((o) => o.id));
  return batch.flatMap((entry) => {
    return through.has(entry.id) ? [] : [subjectOf(entry.body) ?? entry.id];
  });
}

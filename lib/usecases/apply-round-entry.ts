import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { appendAudit } from "@/db/queries/audit";
import { raiseMatter } from "@/db/queries/field-matters";
import { saveStopOrder, type StopPlace } from "@/db/queries/stop-order";
import type { EntryBody } from "@/lib/sync/entries";
import { reordered } from "@/lib/sync/round-order";
import type { Deps, PersonActor } from "./use-case";

interface Entry<Kind> {
  readonly id: string;
  readonly happenedAt: Date;
  readonly body: Extract<EntryBody, { kind: Kind }>;
}

/** Records a load check; a shortage becomes a matter for the office. */
export async function applyLoadCheck(
  trx: Transaction<Database>,
  deps: Deps,
  actor: PersonActor,
  { id, body }: Entry<"load-check">,
  round: { readonly id: string },
): Promise<void> {
  const { lines, stopsShort, note } = body;
  const short = lines.filter((line) => line.packsShort > 0);
  await appendAudit(trx, {
    ...{ at: deps.now(), personId: actor.personId, act: "check-load" },
    ...{ subjectKind: "round", subjectId: round.id },
    detail: { short: short.length, note },
  });
  if (short.length === 0) return;
  await raiseMatter(trx, {
    ...{ id: deps.newId(), kind: "shortage", entryId: id, personId: actor.personId },
    ...{ roundId: round.id, stopId: null, assetId: null, raisedAt: deps.now() },
    detail: { lines: short, stopsShort: stopsShort.length, note },
  });
}

/** Keeps the technician's order of a round. */
export async function applyOrder(
  trx: Transaction<Database>,
  deps: Deps,
  actor: PersonActor,
  { body, happenedAt }: Entry<"reorder">,
  round: { readonly id: string; readonly placed: readonly StopPlace[] },
): Promise<void> {
  const stops = reordered(round.placed, body.stopIds, (stop) => stop);
  await saveStopOrder(trx, round.id, stops, { given: happenedAt, received: deps.now() });
  await appendAudit(trx, {
    ...{ at: deps.now(), personId: actor.personId, act: "reorder-stops" },
    ...{ subjectKind: "round", subjectId: round.id },
    detail: { stops: stops.length },
  });
}

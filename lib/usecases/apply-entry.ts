import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { appendAudit } from "@/db/queries/audit";
import {
  lockRound,
  lockStop,
  markRound,
  markStopCannot,
  markStopDone,
  tickTask,
} from "@/db/queries/field-work";
import { closeMattersOfStop, raiseMatter } from "@/db/queries/field-matters";
import { getOrganisation } from "@/db/queries/organisation";
import { lockStopOrder } from "@/db/queries/stop-order";
import { AppError, forbidden, notFound } from "@/lib/errors";
import { dayOfInstant } from "@/lib/present/calendar-days";
import type { EntryBody } from "@/lib/sync/entries";
import { applyPhoneReading, applyPhoneSwap } from "./apply-pack-entry";
import { applyLoadCheck, applyOrder } from "./apply-round-entry";
import type { Deps, PersonActor } from "./use-case";

export interface EntryToApply {
  readonly id: string;
  readonly happenedAt: Date;
  readonly body: EntryBody;
}

/**
 * Applies one entry of a phone inside the caller's transaction. What was measured or fitted is
 * kept whoever's round the stop is now; what is said about a round must be said by its owner.
 * Locks are taken in the order asset, stop, round.
 * @throws AppError when it cannot be applied (nothing of it remains then); `unavailable` when
 *   it waits for an entry that is still under way
 */
export async function applyEntry(
  trx: Transaction<Database>,
  deps: Deps,
  actor: PersonActor,
  entry: EntryToApply,
): Promise<void> {
  const { body, happenedAt } = entry;
  switch (body.kind) {
    case "reading":
      await applyPhoneReading(trx, deps, actor, { ...entry, body });
      return tick(trx, actor, entry, body, ["read", "inspect"]);
    case "swap":
      await applyPhoneSwap(trx, deps, actor, { ...entry, body });
      return tick(trx, actor, entry, body, ["swap", "read", "inspect"]);
    case "cannot":
      return applyCannot(trx, deps, actor, { ...entry, body });
    case "stop-done": {
      const stop = await ownStop(trx, actor, body.stopId);
      await markStopDone(trx, stop.id, happenedAt);
      await closeMattersOfStop(trx, stop.id, doneAfterAll(deps, actor));
      return markRound(trx, stop.roundId, "started", happenedAt);
    }
    case "note":
      // What was seen stands in the entry itself; the stop must be theirs to speak of.
      return void (await ownStop(trx, actor, body.stopId));
    case "load-check":
      return applyLoadCheck(trx, deps, actor, { ...entry, body }, await ownRound(trx, actor, body));
    case "reorder": {
      const placed = await lockStopOrder(trx, body.roundId);
      const { id } = await ownRound(trx, actor, body);
      return applyOrder(trx, deps, actor, { ...entry, body }, { id, placed });
    }
    case "round": {
      const round = await ownRound(trx, actor, body);
      return markRound(trx, round.id, body.act, happenedAt);
    }
  }
}

function doneAfterAll(deps: Deps, actor: PersonActor) {
  const note = "Done after all.";
  return {
    closedAt: deps.now(),
    closedBy: actor.personId,
    outcome: "closed" as const,
    note,
  };
}

async function ownRound(
  trx: Transaction<Database>,
  actor: PersonActor,
  { roundId }: { readonly roundId: string },
) {
  const round = await lockRound(trx, roundId);
  if (!round) throw notFound("The round");
  refuseOthers(actor, round.technicianId);
  return round;
}

async function applyCannot(
  trx: Transaction<Database>,
  deps: Deps,
  actor: PersonActor,
  entry: EntryToApply & { readonly body: Extract<EntryBody, { kind: "cannot" }> },
): Promise<void> {
  const { body, happenedAt } = entry;
  const stop = await ownStop(trx, actor, body.stopId);
  if (stop.state === "done") {
    throw new AppError("conflict", "This stop is done already: nothing was changed.");
  }
  await markStopCannot(trx, stop.id, body);
  await markRound(trx, stop.roundId, "started", happenedAt);
  await appendAudit(trx, {
    ...{ at: deps.now(), personId: actor.personId, act: "cannot-do-stop" },
    ...{ subjectKind: "stop", subjectId: stop.id },
    detail: { reason: body.reason, returnOn: body.returnOn, note: body.note },
  });
  await raiseMatter(trx, {
    ...{ id: deps.newId(), kind: "cannot", entryId: entry.id, personId: actor.personId },
    ...{ roundId: stop.roundId, stopId: stop.id, assetId: null, raisedAt: deps.now() },
    detail: { reason: body.reason, returnOn: body.returnOn, note: body.note },
  });
}

async function tick(
  trx: Transaction<Database>,
  actor: PersonActor,
  entry: EntryToApply,
  done: { readonly assetId: string; readonly stopId: string | null },
  kinds: readonly string[],
): Promise<void> {
  const { technicianId } = actor;
  if (!technicianId) return;
  const { timeZone } = await getOrganisation(trx);
  const day = dayOfInstant(entry.happenedAt, timeZone);
  await tickTask(trx, { technicianId, ...done, day, kinds, at: entry.happenedAt });
}

async function ownStop(trx: Transaction<Database>, actor: PersonActor, stopId: string) {
  const stop = await lockStop(trx, stopId);
  if (!stop) {
    const message = "This stop was taken out of the rounds meanwhile. Nothing was changed.";
    throw new AppError("not_found", message);
  }
  refuseOthers(actor, stop.technicianId);
  return stop;
}

function refuseOthers(actor: PersonActor, technicianId: string): void {
  const office = actor.roles.some((role) => role === "dispatcher" || role === "administrator");
  if (!office && actor.technicianId !== technicianId) {
    throw forbidden("This round was given to somebody else meanwhile. Your entry was not applied.");
  }
}

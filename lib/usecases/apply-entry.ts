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
import { getOrganisation } from "@/db/queries/organisation";
import { AppError, forbidden, notFound } from "@/lib/errors";
import { dayOfInstant } from "@/lib/present/calendar-days";
import type { EntryBody } from "@/lib/sync/entries";
import { applyPhoneReading, applyPhoneSwap } from "./apply-pack-entry";
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
      return markRound(trx, stop.roundId, "started", happenedAt);
    }
    case "round": {
      const round = await lockRound(trx, body.roundId);
      if (!round) throw notFound("The round");
      refuseOthers(actor, round.technicianId);
      return markRound(trx, round.id, body.act, happenedAt);
    }
  }
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

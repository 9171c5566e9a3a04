import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import {
  lockRound,
  lockStop,
  markRound,
  markStopCannot,
  markStopDone,
  tickTask,
} from "@/db/queries/field-work";
import { getOrganisation } from "@/db/queries/organisation";
import { AppError, forbidden, invalid, notFound } from "@/lib/errors";
import { dayOfInstant } from "@/lib/present/calendar-days";
import type { EntryBody } from "@/lib/sync/entries";
import { logReadings } from "./log-readings";
import { swapPack } from "./swap-pack";
import type { Deps, PersonActor } from "./use-case";

export interface EntryToApply {
  readonly id: string;
  readonly happenedAt: Date;
  readonly body: EntryBody;
}

/**
 * Applies one entry of a phone inside the caller's transaction.
 * @throws AppError when it cannot be applied; nothing of it remains then
 */
export async function applyEntry(
  trx: Transaction<Database>,
  deps: Deps,
  actor: PersonActor,
  entry: EntryToApply,
): Promise<void> {
  const { body } = entry;
  switch (body.kind) {
    case "reading":
      return applyReading(trx, deps, actor, entry, body);
    case "swap":
      return applySwap(trx, deps, actor, entry, body);
    case "cannot": {
      const stop = await ownStop(trx, actor, body.stopId);
      if (stop.state === "done") {
        throw new AppError("conflict", "This stop is done already: nothing was changed.");
      }
      await markStopCannot(trx, stop.id, body);
      return markRound(trx, stop.roundId, "started", entry.happenedAt);
    }
    case "stop-done": {
      const stop = await ownStop(trx, actor, body.stopId);
      await markStopDone(trx, stop.id, entry.happenedAt);
      return markRound(trx, stop.roundId, "started", entry.happenedAt);
    }
    case "round": {
      const round = await lockRound(trx, body.roundId);
      if (!round) throw notFound("The round");
      refuseOthers(actor, round.technicianId);
      return markRound(trx, round.id, body.act, entry.happenedAt);
    }
  }
}

async function applyReading(
  trx: Transaction<Database>,
  deps: Deps,
  actor: PersonActor,
  entry: EntryToApply,
  body: Extract<EntryBody, { kind: "reading" }>,
): Promise<void> {
  const [result] = await logReadings(
    trx,
    deps,
    [{ ...body, id: entry.id, at: entry.happenedAt, kind: body.mode }],
    { source: "phone", personId: actor.personId, apiKeyId: null },
  );
  if (result?.refusal) throw invalid(result.refusal.message, [result.refusal]);
  await tick(trx, deps, actor, entry, body.assetId, ["read", "inspect"]);
}

async function applySwap(
  trx: Transaction<Database>,
  deps: Deps,
  actor: PersonActor,
  entry: EntryToApply,
  body: Extract<EntryBody, { kind: "swap" }>,
): Promise<void> {
  const look = [body.look === "sound" ? "" : body.look, body.note].filter(Boolean).join(": ");
  const stopped = body.reason === "found_stopped";
  await swapPack(trx, deps, {
    assetId: body.assetId,
    at: entry.happenedAt,
    personId: actor.personId,
    out: {
      packId: body.oldPackId,
      reason: body.reason,
      voltageMv: body.voltageOutMv,
      stoppedAt: stopped ? new Date(body.stoppedAt ?? entry.happenedAt) : null,
      look,
    },
    in: {
      id: body.newPackId,
      cellTypeId: body.cellTypeId,
      lotId: body.lotId,
      madeOn: null,
      fromPlaceId: body.fromPlaceId,
    },
  });
  if (body.voltageInMv !== null) await logFirstVoltage(trx, deps, actor, entry, body);
  await tick(trx, deps, actor, entry, body.assetId, ["swap"]);
}

/** The voltage of the fresh pack is logged a second after it went in, under an id of its own. */
async function logFirstVoltage(
  trx: Transaction<Database>,
  deps: Deps,
  actor: PersonActor,
  entry: EntryToApply,
  body: Extract<EntryBody, { kind: "swap" }>,
): Promise<void> {
  const [result] = await logReadings(
    trx,
    deps,
    [
      {
        id: deps.newId(),
        assetId: body.assetId,
        at: new Date(entry.happenedAt.getTime() + 1000),
        millivolts: body.voltageInMv ?? 0,
        kind: "loaded",
      },
    ],
    { source: "phone", personId: actor.personId, apiKeyId: null },
  );
  if (result?.refusal) throw invalid(result.refusal.message, [result.refusal]);
}

async function tick(
  trx: Transaction<Database>,
  deps: Deps,
  actor: PersonActor,
  entry: EntryToApply,
  assetId: string,
  kinds: readonly string[],
): Promise<void> {
  if (!actor.technicianId) return;
  const { timeZone } = await getOrganisation(deps.db);
  const day = dayOfInstant(entry.happenedAt, timeZone);
  const { technicianId } = actor;
  await tickTask(trx, { technicianId, assetId, day, kinds, at: entry.happenedAt });
}

async function ownStop(trx: Transaction<Database>, actor: PersonActor, stopId: string) {
  const stop = await lockStop(trx, stopId);
  if (!stop) throw notFound("The stop");
  refuseOthers(actor, stop.technicianId);
  return stop;
}

function refuseOthers(actor: PersonActor, technicianId: string): void {
  const office = actor.roles.some((role) => role === "dispatcher" || role === "administrator");
  if (!office && actor.technicianId !== technicianId) {
    throw forbidden("This round was given to somebody else meanwhile. Your entry was not applied.");
  }
}

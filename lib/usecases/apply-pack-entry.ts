import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { appendAudit } from "@/db/queries/audit";
import { findInstalledPack, findPack, lockAsset } from "@/db/queries/packs";
import { AppError, conflict, invalid, notFound } from "@/lib/errors";
import type { EntryBody } from "@/lib/sync/entries";
import { fitPack, refuseFuture, repeatOfPack } from "./fit-pack";
import { logReadings, type ReadingOrder } from "./log-readings";
import { swapPack } from "./swap-pack";
import type { Deps, PersonActor } from "./use-case";

type Body<Kind> = Extract<EntryBody, { kind: Kind }>;
interface Entry<Kind> {
  readonly id: string;
  readonly happenedAt: Date;
  readonly body: Body<Kind>;
}

/**
 * Logs a phone's voltage for the pack it was measured on, never for another.
 * @throws AppError unavailable while that pack's own entry is on its way, conflict when another
 *   pack was in the asset, invalid when the voltage cannot be
 */
export async function applyPhoneReading(
  trx: Transaction<Database>,
  deps: Deps,
  actor: PersonActor,
  { id, happenedAt, body }: Entry<"reading">,
): Promise<void> {
  const { packId, mode, ...voltage } = body;
  const at = packId ? await timeOfPack(trx, body.assetId, packId, happenedAt) : happenedAt;
  const order = { ...voltage, id, at, kind: mode };
  await logOne(trx, deps, actor, order, "millivolts");
}

/**
 * When it was measured, within the pack's time in the asset: a clock that was set back between the
 * swap and the reading must not put it down to the pack before.
 */
async function timeOfPack(
  trx: Transaction<Database>,
  assetId: string,
  packId: string,
  at: Date,
): Promise<Date> {
  const pack = await knownPack(trx, packId);
  const out = pack.removedAt !== null && pack.removedAt <= at;
  if (pack.assetId === assetId && !out) return at < pack.installedAt ? pack.installedAt : at;
  throw conflict(
    "The pack this was measured on had been taken out by then, by somebody else's entry. Open the asset again, look at what is in it, and measure anew.",
  );
}

async function knownPack(trx: Transaction<Database>, packId: string) {
  const pack = await findPack(trx, packId);
  if (pack) return pack;
  throw new AppError("unavailable", "It waits for the swap before it: send or mend that first.");
}

/** Records a phone's swap, or the first pack of an empty asset, with its first voltage. */
export async function applyPhoneSwap(
  trx: Transaction<Database>,
  deps: Deps,
  actor: PersonActor,
  entry: Entry<"swap">,
): Promise<void> {
  const { body, happenedAt } = entry;
  if (body.oldPackId) await knownPack(trx, body.oldPackId);
  if (!(await fitEmpty(trx, deps, actor, entry))) {
    const { repeated } = await swapPack(trx, deps, {
      assetId: body.assetId,
      at: happenedAt,
      personId: actor.personId,
      out: outOf(body, happenedAt),
      in: inOf(body),
    });
    if (repeated) return;
  }
  if (body.voltageInMv === null) return;
  const first = {
    id: deps.newId(),
    assetId: body.assetId,
    // The pack is in from this moment on, so its voltage counts as its own.
    at: happenedAt,
    millivolts: body.voltageInMv,
    kind: "loaded" as const,
  };
  await logOne(trx, deps, actor, first, "voltageInMv");
}

/** @returns false when the asset holds a pack, so that it is a swap */
async function fitEmpty(
  trx: Transaction<Database>,
  deps: Deps,
  actor: PersonActor,
  { body, happenedAt: at }: Entry<"swap">,
): Promise<boolean> {
  if (body.oldPackId) return false;
  const asset = await lockAsset(trx, body.assetId);
  if (!asset) throw notFound("The asset");
  if (await repeatOfPack(trx, body.newPackId, asset.id)) return false;
  if (await findInstalledPack(trx, asset.id)) return false;
  refuseFuture(at, deps.now());
  const { personId } = actor;
  await fitPack(trx, deps, asset, { ...inOf(body), at, personId });
  await appendAudit(trx, {
    ...{ at: deps.now(), personId, act: "install-pack" },
    ...{ subjectKind: "asset", subjectId: asset.id },
    detail: { tag: asset.tag, in: body.newPackId },
  });
  return true;
}

function outOf(body: Body<"swap">, happenedAt: Date) {
  const stopped = body.reason === "found_stopped";
  const look = [body.look === "sound" ? "" : body.look, body.note].filter(Boolean).join(": ");
  return {
    packId: body.oldPackId,
    reason: body.reason,
    voltageMv: body.voltageOutMv,
    stoppedAt: stopped ? new Date(body.stoppedAt ?? happenedAt) : null,
    look,
    returned: { cells: body.cellsOut, look: body.look },
  };
}

function inOf(body: Body<"swap">) {
  const { newPackId: id, cellTypeId, lotId, fromPlaceId } = body;
  return { id, cellTypeId, lotId, madeOn: null, fromPlaceId };
}

async function logOne(
  trx: Transaction<Database>,
  deps: Deps,
  actor: PersonActor,
  order: ReadingOrder,
  voltageField: string,
): Promise<void> {
  const origin = { source: "phone", personId: actor.personId, apiKeyId: null } as const;
  const [result] = await logReadings(trx, deps, [order], origin);
  const refusal = result?.refusal;
  if (!refusal) return;
  const field = refusal.field === "millivolts" ? voltageField : refusal.field;
  throw invalid(refusal.message, [{ field, message: refusal.message }]);
}

import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { appendAudit } from "@/db/queries/audit";
import {
  closePack,
  findInstalledPack,
  insertDeviceEvent,
  lockAsset,
  type ReasonOut,
  settleForecast,
} from "@/db/queries/packs";
import { returnCells } from "@/db/queries/returned-cells";
import { conflict, invalid, notFound } from "@/lib/errors";
import { judgeReading } from "./judge-reading";
import type { Chemistry } from "@/lib/battery/pack";
import { fitPack, type PackIn, repeatOfPack, refuseFuture } from "./fit-pack";
import type { Deps } from "./use-case";

/** What came out. */
export interface PackOut {
  /** The pack the person had before them; another one there means somebody was quicker. */
  readonly packId: string | null;
  readonly reason: ReasonOut;
  readonly voltageMv: number | null;
  /** The device was found stopped, or stopped then; null: it still ran. */
  readonly stoppedAt: Date | null;
  readonly lastHeardAt?: Date | null;
  readonly look: string;
  /** What goes into the return box; left out: the whole pack, sound. */
  readonly returned?: { readonly cells: number | null; readonly look: string };
}

export interface SwapOrder {
  readonly assetId: string;
  readonly at: Date;
  readonly personId: string | null;
  readonly out: PackOut;
  /** `in.id` is the client's id of the new pack: sending a swap twice changes nothing. */
  readonly in: PackIn;
}

export interface SwapResult {
  readonly packId: string;
  readonly tag: string;
  /** True when this swap had been recorded before. */
  readonly repeated: boolean;
}

/**
 * Records a swap: closes the old pack, keeps its forecast beside the outcome, opens the new
 * one, moves the cells out of stock and renews the forecast. Shared by office and phone.
 * @throws AppError not_found | conflict (somebody swapped meanwhile) | invalid with faults
 */
export async function swapPack(
  trx: Transaction<Database>,
  deps: Deps,
  order: SwapOrder,
): Promise<SwapResult> {
  const asset = await lockAsset(trx, order.assetId);
  if (!asset) throw notFound("The asset");
  const done = { packId: order.in.id, tag: asset.tag };
  if (await repeatOfPack(trx, order.in.id, asset.id)) return { ...done, repeated: true };
  refuseFuture(order.at, deps.now());
  const old = await findInstalledPack(trx, asset.id);
  if (!old) throw conflict(`${asset.tag} holds no pack now: record an install instead of a swap.`);
  if (order.out.packId && order.out.packId !== old.id) {
    throw conflict(
      `The pack of ${asset.tag} was swapped by somebody else meanwhile. Open the asset again and look at what is in it now.`,
    );
  }
  await takeOut(trx, deps, asset, old, order);
  await fitPack(trx, deps, asset, { ...order.in, at: order.at, personId: order.personId });
  await appendAudit(trx, {
    at: deps.now(),
    personId: order.personId,
    act: "record-swap",
    subjectKind: "asset",
    subjectId: asset.id,
    detail: { tag: asset.tag, out: old.id, in: order.in.id, reason: order.out.reason },
  });
  return { ...done, repeated: false };
}

type Locked = NonNullable<Awaited<ReturnType<typeof lockAsset>>>;
type Installed = NonNullable<Awaited<ReturnType<typeof findInstalledPack>>>;

/**
 * Closes the installed pack and settles its forecast; the caller holds the asset's lock.
 * @throws AppError invalid with the field at fault
 */
export async function takeOut(
  trx: Transaction<Database>,
  deps: Deps,
  asset: Locked,
  old: Installed,
  order: Pick<SwapOrder, "at" | "personId" | "out">,
): Promise<void> {
  checkRemoval(old, order);
  const { out, at, personId } = order;
  await closePack(trx, old.id, {
    removedAt: at,
    removedBy: personId,
    reasonOut: out.reason,
    voltageOutMv: out.voltageMv,
    stoppedAt: out.stoppedAt,
    lookOut: out.look,
  });
  await settleForecast(trx, old.id, {
    recordedAt: deps.now(),
    censored: out.stoppedAt === null,
    endedAt: out.stoppedAt ?? at,
  });
  await returnCells(trx, {
    ...{ packId: old.id, cellTypeId: old.cellTypeId, lotId: old.lotId, at, personId },
    cells: out.returned?.cells ?? old.series * old.parallel,
    look: out.returned?.look ?? "sound",
  });
  if (out.stoppedAt) {
    await insertDeviceEvent(trx, {
      id: deps.newId(),
      assetId: asset.id,
      at: out.stoppedAt,
      kind: "stopped",
      lastHeardAt: out.lastHeardAt ?? null,
      note: "",
      personId,
    });
  }
}

function checkRemoval(old: Installed, order: Pick<SwapOrder, "at" | "out">): void {
  if (order.at <= old.installedAt) {
    const since = old.installedAt.toISOString().slice(0, 16).replace("T", " ");
    throw fault("at", `The pack went in on ${since} UTC: it can only come out later.`);
  }
  const { stoppedAt, voltageMv } = order.out;
  if (stoppedAt && (stoppedAt < old.installedAt || stoppedAt > order.at)) {
    throw fault("stoppedAt", "The device stopped while this pack was in it: check the date.");
  }
  if (voltageMv === null) return;
  const { refusal } = judgeReading(
    {
      chemistry: old.chemistry as Chemistry,
      nominalMv: old.nominalMv,
      series: old.series,
      cutoffMv: 0,
      previousRestingMv: null,
    },
    { millivolts: voltageMv, kind: "resting", temperatureDc: null },
  );
  if (refusal) throw fault("voltageOut", refusal);
}

function fault(field: string, message: string) {
  return invalid(message, [{ field, message }]);
}

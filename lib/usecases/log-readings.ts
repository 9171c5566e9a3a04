import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { findReadingTargets, type ReadingTarget } from "@/db/queries/reading-targets";
import { insertReadings, type NewReading, type ReadingOrigin } from "@/db/queries/readings";
import type { Chemistry } from "@/lib/battery/pack";
import { judgeReading } from "./judge-reading";
import { touchForecasts } from "./touch-forecasts";
import type { Deps } from "./use-case";

/** One voltage as an entrance hands it over; `tag` or `assetId` says where. */
export interface ReadingOrder {
  /** Made by the client; sending it twice changes nothing. */
  readonly id: string;
  readonly tag?: string | undefined;
  readonly assetId?: string | undefined;
  readonly at: Date;
  readonly millivolts: number;
  readonly kind: "resting" | "loaded";
  readonly loadUa?: number | null | undefined;
  readonly temperatureDc?: number | null | undefined;
  readonly accuracyMv?: number | null | undefined;
  readonly instrument?: string | undefined;
  readonly note?: string | undefined;
}

export interface ReadingResult {
  readonly id: string;
  readonly status: "logged" | "repeated" | "refused";
  readonly packId: string | null;
  /** Logged, but unlikely: why. */
  readonly doubt: string | null;
  /** Refused: which entry, why, and what to do. */
  readonly refusal: { readonly field: "tag" | "at" | "millivolts" | "id"; message: string } | null;
}

/** Clocks of phones and gateways run a little ahead. */
const CLOCK_LEEWAY_MS = 10 * 60_000;

/**
 * Logs voltages: form, API, phone and file share it. Impossible values are refused one by
 * one, unlikely ones are kept and marked, repeats (same id) change nothing. Forecasts of
 * the packs read are renewed.
 * @returns one result an order, in the order given
 */
export async function logReadings(
  trx: Transaction<Database>,
  deps: Deps,
  orders: readonly ReadingOrder[],
  origin: Omit<ReadingOrigin, "receivedAt">,
): Promise<ReadingResult[]> {
  if (orders.length === 0) return [];
  const now = deps.now();
  const { results, fresh } = await checkReadings(trx, orders, now, origin.source === "csv");
  const inserted = await insertReadings(trx, fresh, { ...origin, receivedAt: now });
  const touched = new Set(fresh.filter((r) => inserted.has(r.id)).map((r) => r.packId));
  await touchForecasts(trx, deps, [...touched]);
  return results.map((r) =>
    r.status === "logged" && !inserted.has(r.id) ? { ...r, status: "repeated" } : r,
  );
}

/** What logging these would do, without doing it: the dry run of a file uses it as it is. */
export async function checkReadings(
  trx: Transaction<Database>,
  orders: readonly ReadingOrder[],
  now: Date,
  fromFile: boolean,
): Promise<{ results: ReadingResult[]; fresh: NewReading[] }> {
  const places = orders.map((o) => ({
    id: o.id,
    tag: o.tag ?? null,
    assetId: o.assetId ?? null,
    at: o.at,
  }));
  const targets = await findReadingTargets(trx, places, !fromFile);
  const judged = judgeInTime(orders, targets, now);
  const results = judged.map((r, n): ReadingResult => {
    const known = fromFile && r.status === "logged" && isKnown(orders[n], targets[n]);
    return known ? { ...r, status: "repeated", doubt: null } : r;
  });
  const fresh = results.flatMap((result, n) => {
    const order = orders[n];
    return order && result.status === "logged" && result.packId
      ? [asNewReading(order, result.packId, result.doubt)]
      : [];
  });
  return { results, fresh };
}

/** A file's row may tell what phone or gateway logged before, under an id of their own. */
function isKnown(order: ReadingOrder | undefined, target: ReadingTarget | undefined): boolean {
  return (target?.atOnce ?? []).some((v) => v.mv === order?.millivolts && v.kind === order.kind);
}

/** Judges oldest first, so that one of the batch can be the voltage before another. */
function judgeInTime(
  orders: readonly ReadingOrder[],
  targets: readonly ReadingTarget[],
  now: Date,
): ReadingResult[] {
  const results: ReadingResult[] = [];
  const last = new Map<string, { at: number; mv: number }>();
  const byTime = orders.map((o, n) => ({ n, at: o.at.getTime() })).sort((a, b) => a.at - b.at);
  for (const { n, at } of byTime) {
    const [order, target] = [orders[n], targets[n]];
    if (!order || !target) continue;
    const inBatch = target.pack ? last.get(target.pack.id) : undefined;
    const useBatch = inBatch && inBatch.at < at && inBatch.at > (target.previous?.at ?? 0);
    const before = useBatch ? inBatch : target.previous;
    const result = judge(order, target, before?.mv ?? null, now);
    results[n] = result;
    if (result.packId && result.status !== "refused" && order.kind === "resting") {
      last.set(result.packId, { at, mv: order.millivolts });
    }
  }
  return results;
}

function judge(
  order: ReadingOrder,
  target: ReadingTarget,
  previousRestingMv: number | null,
  now: Date,
): ReadingResult {
  const { pack, cutoffMv } = target;
  if (!target.assetId) return refused(order, null, "tag", "There is no asset with this tag.");
  if (order.at.getTime() > now.getTime() + CLOCK_LEEWAY_MS) {
    return refused(order, null, "at", "This moment is still to come: check the date and the zone.");
  }
  if (!pack) {
    return refused(order, null, "at", "No pack was in this asset then: log its install first.");
  }
  if (target.keptMv !== null) return repeated(order, pack.id, target.keptMv);
  const { refusal, doubt } = judgeReading(
    { ...pack, chemistry: pack.chemistry as Chemistry, cutoffMv, previousRestingMv },
    { ...order, temperatureDc: order.temperatureDc ?? null },
  );
  if (refusal) return refused(order, pack.id, "millivolts", refusal);
  return { id: order.id, status: "logged", packId: pack.id, doubt, refusal: null };
}

function repeated(order: ReadingOrder, packId: string, keptMv: number): ReadingResult {
  return keptMv === order.millivolts
    ? { id: order.id, status: "repeated", packId, doubt: null, refusal: null }
    : refused(order, packId, "id", "This id was used before, for another voltage.");
}

function refused(
  order: ReadingOrder,
  packId: string | null,
  field: NonNullable<ReadingResult["refusal"]>["field"],
  message: string,
): ReadingResult {
  return { id: order.id, status: "refused", packId, doubt: null, refusal: { field, message } };
}

function asNewReading(order: ReadingOrder, packId: string, doubt: string | null): NewReading {
  return {
    id: order.id,
    packId,
    at: order.at,
    millivolts: order.millivolts,
    kind: order.kind,
    loadUa: order.loadUa ?? null,
    temperatureDc: order.temperatureDc ?? null,
    accuracyMv: order.accuracyMv ?? null,
    instrument: order.instrument ?? "",
    note: order.note ?? "",
    doubt,
  };
}

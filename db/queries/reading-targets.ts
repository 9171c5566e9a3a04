import { sql, type Transaction } from "kysely";
import type { Database } from "../client";

/** Where and when a voltage was read: by tag or by asset id. */
export interface ReadingPlace {
  readonly id: string;
  readonly tag: string | null;
  readonly assetId: string | null;
  readonly at: Date;
}

/** What the register knows about one place and moment. */
export interface ReadingTarget {
  readonly assetId: string | null;
  readonly pack: TargetPack | null;
  readonly cutoffMv: number;
  /** The resting voltage stored last before the moment. */
  readonly previous: StoredVoltage | null;
  /** The voltage already kept under this id, if there is one. */
  readonly keptMv: number | null;
}

export interface TargetPack {
  readonly id: string;
  readonly installedAt: Date;
  readonly removedAt: Date | null;
  readonly series: number;
  readonly chemistry: string;
  readonly nominalMv: number;
}

export interface StoredVoltage {
  readonly at: number;
  readonly mv: number;
}

/**
 * The pack that was in each asset at each moment, with what a voltage is judged against, in
 * the order asked. Three statements for any number of places; joined here, because one
 * statement would look every row up by itself.
 */
export async function findReadingTargets(
  trx: Transaction<Database>,
  places: readonly ReadingPlace[],
): Promise<ReadingTarget[]> {
  const assets = await findAssets(trx, places);
  const kept = await findKept(trx, places);
  const found = places.map((place) => {
    const asset = assets.get(place.tag ?? place.assetId ?? "");
    const pack = asset?.packs.find(
      (p) => p.installedAt <= place.at && (p.removedAt === null || p.removedAt > place.at),
    );
    return { place, asset, pack: pack ?? null };
  });
  const stored = await findStored(
    trx,
    found.flatMap((f) => (f.pack ? [{ packId: f.pack.id, at: f.place.at.getTime() }] : [])),
  );
  return found.map(({ place, asset, pack }) => ({
    assetId: asset?.id ?? null,
    pack,
    cutoffMv: asset?.cutoffMv ?? 0,
    previous: lastBefore(stored.get(pack?.id ?? "") ?? [], place.at.getTime()),
    keptMv: kept.get(place.id) ?? null,
  }));
}

interface AssetWithPacks {
  readonly id: string;
  readonly cutoffMv: number;
  readonly packs: TargetPack[];
}

/** Assets under their tag and their id, each with all packs it has had. */
async function findAssets(trx: Transaction<Database>, places: readonly ReadingPlace[]) {
  const tags = [...new Set(places.flatMap((p) => p.tag ?? []))];
  const ids = [...new Set(places.flatMap((p) => (p.tag === null ? (p.assetId ?? []) : [])))];
  const { rows } = await sql<TargetPack & { assetId: string; tag: string; cutoffMv: number }>`
    select a.id as asset_id, a.tag, m.cutoff_mv, p.id, p.installed_at, p.removed_at, p.series,
      c.chemistry, c.nominal_mv
    from asset a
    join device_model m on m.id = a.device_model_id
    left join pack p on p.asset_id = a.id
    left join cell_type c on c.id = p.cell_type_id
    where a.tag = any(${tags}::text[]) or a.id = any(${ids}::uuid[])`.execute(trx);
  const assets = new Map<string, AssetWithPacks>();
  for (const { assetId, tag, cutoffMv, ...pack } of rows) {
    const asset = assets.get(assetId) ?? { id: assetId, cutoffMv, packs: [] };
    // An asset that never held a pack comes as one row without a pack's id.
    if ((pack.id as string | null) !== null) asset.packs.push(pack);
    assets.set(assetId, asset);
    assets.set(tag, asset);
  }
  return assets;
}

async function findKept(trx: Transaction<Database>, places: readonly ReadingPlace[]) {
  const { rows } = await sql<{ id: string; millivolts: number }>`
    select id, millivolts from reading where id = any(${places.map((p) => p.id)}::uuid[])`.execute(
    trx,
  );
  return new Map(rows.map((row) => [row.id, row.millivolts]));
}

/** Stored resting voltages of each pack, oldest first: the last before its first moment asked, and those up to its last. */
async function findStored(
  trx: Transaction<Database>,
  asked: readonly { readonly packId: string; readonly at: number }[],
): Promise<Map<string, StoredVoltage[]>> {
  const spans = new Map<string, { pack_id: string; first: number; last: number }>();
  for (const { packId, at } of asked) {
    const span = spans.get(packId) ?? { pack_id: packId, first: at, last: at };
    span.first = Math.min(span.first, at);
    span.last = Math.max(span.last, at);
    spans.set(packId, span);
  }
  const rows = [...spans.values()].map((s) => ({
    ...s,
    first: new Date(s.first),
    last: new Date(s.last),
  }));
  const result = await sql<{ packId: string; at: Date; mv: number }>`
    with span as (select * from
      json_to_recordset(${JSON.stringify(rows)}::json) as s(pack_id uuid, first timestamptz, last timestamptz))
    select span.pack_id, r.at, r.millivolts as mv from span cross join lateral (
      (select at, millivolts from reading where pack_id = span.pack_id and kind = 'resting'
        and at < span.first order by at desc limit 1)
      union all
      (select at, millivolts from reading where pack_id = span.pack_id and kind = 'resting'
        and at >= span.first and at < span.last)) r
    order by r.at`.execute(trx);
  const stored = new Map<string, StoredVoltage[]>();
  for (const { packId, at, mv } of result.rows) {
    const list = stored.get(packId);
    if (list) list.push({ at: at.getTime(), mv });
    else stored.set(packId, [{ at: at.getTime(), mv }]);
  }
  return stored;
}

function lastBefore(stored: readonly StoredVoltage[], at: number): StoredVoltage | null {
  return stored.findLast((voltage) => voltage.at < at) ?? null;
}

/** One voltage as a file tells it, of a pack that is known. */
export interface ToldVoltage {
  readonly packId: string;
  readonly at: Date;
  readonly millivolts: number;
  readonly kind: string;
}

/** Which of these are kept already, under whatever id: their places in the list. */
export async function findSameVoltages(
  trx: Transaction<Database>,
  told: readonly ToldVoltage[],
): Promise<Set<number>> {
  const rows = told.map((t, n) => ({
    ...{ n, pack_id: t.packId, at: t.at, mv: t.millivolts, kind: t.kind },
  }));
  const result = await sql<{ n: number }>`
    select distinct i.n
    from json_to_recordset(${JSON.stringify(rows)}::json)
      as i(n int, pack_id uuid, at timestamptz, mv int, kind text)
    join reading r on r.pack_id = i.pack_id and r.at = i.at and r.millivolts = i.mv
      and r.kind = i.kind`.execute(trx);
  return new Set(result.rows.map((row) => row.n));
}

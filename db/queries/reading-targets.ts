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
  /** What is stored of the pack at the very moment, under whatever id. */
  readonly atOnce: readonly StoredVoltage[];
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
  readonly kind: string;
}

const NONE: readonly StoredVoltage[] = [];

/**
 * The pack that was in each asset at each moment, with what a voltage is judged against, in
 * the order asked. Three statements for any number of places; joined here, because one
 * statement would look every row up by itself.
 */
export async function findReadingTargets(
  trx: Transaction<Database>,
  places: readonly ReadingPlace[],
  askIds: boolean,
): Promise<ReadingTarget[]> {
  const assets = await findAssets(trx, places);
  const kept = askIds ? await findKept(trx, places) : new Map<string, number>();
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
  return found.map(({ place, asset, pack }) => {
    const list = (pack && stored.get(pack.id)) ?? NONE;
    const at = place.at.getTime();
    return {
      assetId: asset?.id ?? null,
      pack,
      cutoffMv: asset?.cutoffMv ?? 0,
      previous: list.findLast((v) => v.at < at && v.kind === "resting") ?? null,
      atOnce: list === NONE ? NONE : list.filter((v) => v.at === at),
      keptMv: kept.get(place.id) ?? null,
    };
  });
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

/**
 * Stored voltages of each pack, oldest first: the resting one before its first moment asked,
 * and all from there to its last.
 */
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
  const result = await sql<{ packId: string; at: Date; mv: number; kind: string }>`
    with span as (select * from
      json_to_recordset(${JSON.stringify(rows)}::json) as s(pack_id uuid, first timestamptz, last timestamptz))
    select span.pack_id, r.at, r.millivolts as mv, r.kind from span cross join lateral (
      (select at, millivolts, kind from reading where pack_id = span.pack_id
        and kind = 'resting' and at < span.first order by at desc limit 1)
      union all
      (select at, millivolts, kind from reading where pack_id = span.pack_id
        and at between span.first and span.last)) r
    order by r.at`.execute(trx);
  const stored = new Map<string, StoredVoltage[]>();
  for (const { packId, at, ...rest } of result.rows) {
    const voltage = { ...rest, at: at.getTime() };
    const list = stored.get(packId);
    if (list) list.push(voltage);
    else stored.set(packId, [voltage]);
  }
  return stored;
}

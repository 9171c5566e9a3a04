import {
  findLotsByCode,
  findPacksOfAssets,
  insertStops,
  upsertPacks,
  type WholePack,
} from "@/db/queries/bulk-packs";
import { findAssetsByTag, findNames } from "@/db/queries/bulk-register";
import { insertLot } from "@/db/queries/lots";
import { settleForecast } from "@/db/queries/packs";
import type { ImportRecord } from "@/lib/csv/read-records";
import { type Install, planInstalls } from "./plan-installs";
import { type ImportContext, ImportOutcome } from "./import-outcome";
import { naturalId } from "./natural-id";
import { touchForecasts } from "./touch-forecasts";

/**
 * Packs put into assets and taken out again. A pack is known by its asset and the moment it
 * went in. Lots that are not known are made, with no cells in stock.
 */
export async function importInstalls(context: ImportContext): Promise<ImportOutcome> {
  const outcome = new ImportOutcome(context);
  const { trx } = context;
  const installs = await readInstalls(context, outcome);
  const known = await findPacksOfAssets(trx, [...new Set(installs.map((i) => i.asset.id))]);
  const plan = planInstalls(installs, known, outcome, context);
  if (context.write) await write(context, plan);
  await context.progress(context.records.length);
  return outcome;
}

async function readInstalls(context: ImportContext, outcome: ImportOutcome): Promise<Install[]> {
  const { trx, records } = context;
  const tags = [...new Set(records.map((r) => String(r.values.tag)))];
  const codes = [...new Set(records.map((r) => String(r.values.lot ?? "")))].filter(Boolean);
  const [assets, names, lots] = await Promise.all([
    findAssetsByTag(trx, tags),
    findNames(trx),
    findLotsByCode(trx, codes),
  ]);
  const assetOf = new Map(assets.map((a) => [a.tag, a]));
  const cellsOf = new Map(names.cellTypes.map((c) => [c.name.toLowerCase(), c.id]));
  const lotOf = new Map(lots.map((l) => [l.code, l]));
  return records.flatMap((record) => {
    const { tag, cells, lot } = record.values;
    const asset = assetOf.get(String(tag));
    const cellTypeId = cellsOf.get(String(cells).toLowerCase());
    const lotRow = lot ? lotOf.get(String(lot)) : undefined;
    if (!asset) outcome.refuse(record.row, "tag", `There is no asset ${String(tag)}.`);
    if (!cellTypeId) {
      outcome.refuse(record.row, "cells", `There is no cell type ${String(cells)}.`);
    } else if (lotRow && lotRow.cellTypeId !== cellTypeId) {
      outcome.refuse(record.row, "lot", `The lot ${String(lot)} is of another cell type.`);
    }
    checkTimes(record, outcome, context);
    if (!asset || !cellTypeId || outcome.isRefused(record.row)) return [];
    return [asInstall(record, asset, cellTypeId, lotRow?.id ?? null)];
  });
}

function checkTimes(record: ImportRecord, outcome: ImportOutcome, context: ImportContext): void {
  const { installed, removed, stopped } = record.values;
  const latest = context.deps.now().getTime() + 10 * 60_000;
  const late = (value: unknown) => value instanceof Date && value.getTime() > latest;
  if (late(installed)) outcome.refuse(record.row, "installed", "This moment is still to come.");
  if (late(removed)) outcome.refuse(record.row, "removed", "This moment is still to come.");
  if (installed instanceof Date && removed instanceof Date && removed <= installed) {
    outcome.refuse(record.row, "removed", "It came out before it went in.");
  }
  if (!(stopped instanceof Date && installed instanceof Date)) return;
  if (stopped < installed || (removed instanceof Date && stopped > removed)) {
    outcome.refuse(record.row, "stopped", "The device stopped while this pack was in it.");
  }
}

function asInstall(
  record: ImportRecord,
  asset: Install["asset"] & { readonly series: number; readonly parallel: number },
  cellTypeId: string,
  lotId: string | null,
): Install {
  const { installed, removed, stopped, reason, voltageOut, look, made, lot } = record.values;
  const date = (value: unknown) => (value instanceof Date ? value : null);
  const stoppedAt = date(stopped);
  const count = (value: unknown, usual: number) => (typeof value === "number" ? value : usual);
  return {
    ...{ row: record.row, asset, cellTypeId, lotId, lotCode: lot ? String(lot) : null },
    installedAt: date(installed) ?? new Date(0),
    // A pack that is out may have been made up otherwise than the model says now.
    series: count(record.values.series, asset.series),
    parallel: count(record.values.parallel, asset.parallel),
    madeOn: typeof made === "string" ? made : null,
    removedAt: date(removed),
    reasonOut: typeof reason === "string" ? reason : stoppedAt ? "found_stopped" : null,
    voltageOutMv: typeof voltageOut === "number" ? voltageOut : null,
    stoppedAt,
    look: typeof look === "string" ? look : null,
  };
}

type Plan = ReturnType<typeof planInstalls>;

async function write(context: ImportContext, plan: Plan): Promise<void> {
  const { trx, deps, personId } = context;
  await makeLots(context, plan);
  await upsertPacks(trx, plan.known, plan.fresh);
  const ended = [...plan.known, ...plan.fresh].filter((p) => p.removedAt !== null);
  for (const pack of plan.known) {
    if (!pack.removedAt) continue;
    await settleForecast(trx, pack.id, {
      recordedAt: deps.now(),
      censored: pack.stoppedAt === null,
      endedAt: pack.stoppedAt ?? pack.removedAt,
    });
  }
  const stops = ended.flatMap((p) =>
    p.stoppedAt
      ? [{ id: naturalId("stop", p.id), assetId: p.assetId, at: p.stoppedAt, personId }]
      : [],
  );
  await insertStops(trx, stops);
  const open = [...plan.known, ...plan.fresh].filter((p) => p.removedAt === null);
  await touchForecasts(
    trx,
    deps,
    open.map((p) => p.id),
  );
}

/** Lots the file names and nobody received: kept for tracing, with nothing in stock. */
async function makeLots({ trx }: ImportContext, plan: Plan): Promise<void> {
  const cells = new Map<string, { code: string; first: WholePack; count: number }>();
  for (const pack of plan.fresh) {
    const code = plan.newLots.get(pack.lotId ?? "");
    if (!code || !pack.lotId) continue;
    const lot = cells.get(pack.lotId) ?? { code, first: pack, count: 0 };
    cells.set(pack.lotId, {
      code,
      first: pack.installedAt < lot.first.installedAt ? pack : lot.first,
      count: lot.count + pack.series * pack.parallel,
    });
  }
  for (const [id, { code, first, count }] of cells) {
    const receivedOn = first.installedAt.toISOString().slice(0, 10);
    const madeOn = first.madeOn && first.madeOn <= receivedOn ? first.madeOn : null;
    await insertLot(trx, {
      ...{ id, code, cellTypeId: first.cellTypeId, madeOn, receivedOn },
      ...{ supplierReference: "", cellsReceived: count, unitCostMinor: 0 },
    });
  }
}

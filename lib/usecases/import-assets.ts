import {
  findAssetsByTag,
  findClosures,
  findNames,
  findSitesByCode,
  replaceClosures,
  upsertAssets,
  upsertSites,
} from "@/db/queries/bulk-register";
import type { AssetRecord, AssetState } from "@/db/queries/assets";
import { installedPackIds } from "@/db/queries/forecasts";
import type { ImportRecord } from "@/lib/csv/read-records";
import { planSites, type SitePlan } from "./import-sites";
import { given, type ImportContext, ImportOutcome, overlay } from "./import-outcome";
import { naturalId } from "./natural-id";
import { touchForecasts } from "./touch-forecasts";

type Asset = AssetRecord & { readonly state: AssetState };

/**
 * Assets with their sites. An asset is known by its tag, a site by its code; an empty cell
 * leaves what is there as it is.
 */
export async function importAssets(context: ImportContext): Promise<ImportOutcome> {
  const outcome = new ImportOutcome(context);
  const { trx, records, deps } = context;
  const codes = [...new Set(records.map((r) => String(r.values.site)))];
  const tags = records.map((r) => String(r.values.tag));
  const [names, sites, assets] = await Promise.all([
    findNames(trx),
    findSitesByCode(trx, codes),
    findAssetsByTag(trx, tags),
  ]);
  const seasons = await findClosures(
    trx,
    sites.map((s) => s.id),
  );
  const sitePlans = planSites(context, outcome, sites, names, seasons);
  const known = new Map(assets.map((a) => [a.tag, a]));
  const models = new Map(names.models.map((m) => [m.name.toLowerCase(), m.id]));
  const { writes, moved } = planAssets(context, outcome, { known, models, sitePlans });
  if (context.write) {
    const plans = [...sitePlans.values()].filter((p) => p.changed.length > 0 || p.isNew);
    await upsertSites(
      trx,
      plans.map((p) => p.site),
    );
    await replaceClosures(
      trx,
      new Map(plans.flatMap((p) => (p.closures ? [[p.site.id, p.closures]] : []))),
    );
    await upsertAssets(trx, writes);
    if (moved.length > 0) await touchForecasts(trx, deps, await installedPackIds(trx, moved));
  }
  await context.progress(records.length);
  return outcome;
}

interface AssetLookups {
  readonly known: ReadonlyMap<string, Awaited<ReturnType<typeof findAssetsByTag>>[number]>;
  readonly models: ReadonlyMap<string, string>;
  readonly sitePlans: ReadonlyMap<string, SitePlan>;
}

function planAssets(context: ImportContext, outcome: ImportOutcome, lookups: AssetLookups) {
  const writes: Asset[] = [];
  const moved: string[] = [];
  const seen = new Map<string, number>();
  for (const record of context.records) {
    const tag = String(record.values.tag);
    const earlier = seen.get(tag);
    if (earlier !== undefined) {
      outcome.refuse(record.row, "tag", `The tag ${tag} stands in row ${earlier} already.`);
    }
    seen.set(tag, record.row);
    const deviceModelId = lookups.models.get(String(record.values.model).toLowerCase());
    if (!deviceModelId) {
      const message = `There is no device model ${String(record.values.model)}: import the device models first.`;
      outcome.refuse(record.row, "model", message);
    }
    const plan = lookups.sitePlans.get(String(record.values.site));
    if (!plan || !deviceModelId || outcome.isRefused(record.row)) continue;
    const before = lookups.known.get(tag);
    const changes = assetChanges(record, plan.site.id, deviceModelId);
    const base: Asset = before
      ? { ...before, state: before.state as AssetState }
      : blankAsset(tag, context.deps.now());
    const { after, changed } = overlay(base, changes);
    const words = [...named(changed, plan, record), ...siteWords(plan, record.row)];
    const isNew = before === undefined;
    outcome.settle(
      record.row,
      isNew ? "new" : words.length > 0 ? "changed" : "same",
      words.join("; "),
    );
    if (isNew || changed.length > 0) writes.push({ ...after, updatedAt: context.deps.now() });
    if (before && before.deviceModelId !== deviceModelId) moved.push(before.id);
  }
  return { writes, moved };
}

/** Ids mean nothing to a person: what changed is told in the file's own words. */
function named(changed: readonly string[], plan: SitePlan, record: ImportRecord): string[] {
  return changed.flatMap((words) => {
    if (words.startsWith("siteId:")) return [`site: ${plan.site.code}`];
    if (words.startsWith("deviceModelId:")) return [`model: ${String(record.values.model)}`];
    return [words];
  });
}

function siteWords(plan: SitePlan, row: number): string[] {
  if (plan.firstRow !== row) return [];
  if (plan.isNew) return [`new site ${plan.site.code}`];
  return plan.changed.map((words) => `site ${words}`);
}

function assetChanges(record: ImportRecord, siteId: string, deviceModelId: string): Partial<Asset> {
  const { name, state, firmware, silence, note } = given(record);
  return {
    ...{ siteId, deviceModelId },
    ...(name !== undefined && { name: String(name) }),
    ...(state !== undefined && { state: state as AssetState }),
    ...(firmware !== undefined && { firmware: String(firmware) }),
    ...(silence !== undefined && { silenceCostMinorPerHour: Number(silence) }),
    ...(note !== undefined && { note: String(note) }),
  };
}

function blankAsset(tag: string, updatedAt: Date): Asset {
  return {
    ...{ id: naturalId("asset", tag), tag, name: "", siteId: "", deviceModelId: "" },
    ...{ state: "in_service", silenceCostMinorPerHour: null, firmware: "", note: "", updatedAt },
  };
}

import type { PackRecordRow, WholePack } from "@/db/queries/bulk-packs";
import type { ReasonOut } from "@/db/queries/packs";
import type { ImportContext, ImportOutcome } from "./import-outcome";
import { naturalId } from "./natural-id";

/** One row of an installs file, with its names looked up. */
export interface Install {
  readonly row: number;
  readonly asset: {
    readonly id: string;
    readonly tag: string;
  };
  readonly cellTypeId: string;
  readonly series: number;
  readonly parallel: number;
  readonly lotId: string | null;
  readonly lotCode: string | null;
  readonly installedAt: Date;
  readonly madeOn: string | null;
  readonly removedAt: Date | null;
  readonly reasonOut: string | null;
  readonly voltageOutMv: number | null;
  readonly stoppedAt: Date | null;
  readonly look: string | null;
}

interface Entry {
  readonly row: number | null;
  readonly isNew: boolean;
  readonly before: WholePack | null;
  after: WholePack;
}

export interface InstallPlan {
  readonly known: readonly WholePack[];
  readonly fresh: readonly WholePack[];
  /** Lots to make: id to code. */
  readonly newLots: ReadonlyMap<string, string>;
}

/** Fits the rows into what each asset has had; overlaps are refused. */
export function planInstalls(
  installs: readonly Install[],
  known: readonly PackRecordRow[],
  outcome: ImportOutcome,
  context: Pick<ImportContext, "closePrevious" | "personId">,
): InstallPlan {
  const lines = new Map<string, Entry[]>();
  for (const row of known) push(lines, row.assetId, knownEntry(row));
  for (const install of installs) addInstall(lines, install, outcome, context.personId);
  const changed: Entry[] = [];
  for (const line of lines.values()) {
    line.sort((a, b) => a.after.installedAt.getTime() - b.after.installedAt.getTime());
    if (context.closePrevious) closeOpenOnes(line);
    refuseOverlaps(line, outcome);
    changed.push(...settleLine(line, outcome));
  }
  const newLots = new Map(
    installs.flatMap((i) => (i.lotCode && !i.lotId ? [[lotIdOf(i.lotCode), i.lotCode]] : [])),
  );
  return {
    known: changed.filter((e) => !e.isNew).map((e) => e.after),
    fresh: changed.filter((e) => e.isNew).map((e) => e.after),
    newLots,
  };
}

function push(lines: Map<string, Entry[]>, assetId: string, entry: Entry): void {
  const line = lines.get(assetId);
  if (line) line.push(entry);
  else lines.set(assetId, [entry]);
}

function knownEntry(row: PackRecordRow): Entry {
  const pack = { ...row, reasonOut: row.reasonOut as ReasonOut | null };
  return { row: null, isNew: false, before: pack, after: pack };
}

function addInstall(
  lines: Map<string, Entry[]>,
  install: Install,
  outcome: ImportOutcome,
  personId: string | null,
): void {
  const line = lines.get(install.asset.id) ?? [];
  const at = install.installedAt.getTime();
  const same = line.findIndex((e) => e.after.installedAt.getTime() === at);
  const old = line[same];
  if (old && old.row !== null) {
    const message = `Row ${old.row} puts a pack into ${install.asset.tag} at the same time.`;
    outcome.refuse(install.row, "installed", message);
    return;
  }
  const after = old ? overKnown(old.after, install) : asPack(install, personId);
  const entry = { row: install.row, isNew: !old, before: old?.before ?? null, after };
  if (old) line[same] = entry;
  else push(lines, install.asset.id, entry);
}

function lotIdOf(code: string): string {
  return naturalId("lot", code);
}

function asPack(install: Install, personId: string | null): WholePack {
  const { asset, installedAt, cellTypeId, madeOn, series, parallel } = install;
  return {
    id: naturalId("pack", asset.tag, installedAt.toISOString()),
    ...{ assetId: asset.id, series, parallel },
    ...{ cellTypeId, madeOn, installedAt, installedBy: personId },
    lotId: install.lotId ?? (install.lotCode ? lotIdOf(install.lotCode) : null),
    ...removalOf(install, personId),
  };
}

function removalOf(install: Install, personId: string | null) {
  const out = install.removedAt !== null;
  return {
    removedAt: install.removedAt,
    removedBy: out ? personId : null,
    reasonOut: out ? ((install.reasonOut ?? "other") as ReasonOut) : null,
    voltageOutMv: install.voltageOutMv,
    stoppedAt: install.stoppedAt,
    lookOut: install.look ?? "",
  };
}

/** An empty cell leaves what is there as it is. */
function overKnown(pack: WholePack, install: Install): WholePack {
  const removedAt = install.removedAt ?? pack.removedAt;
  const reason = (install.reasonOut as ReasonOut | null) ?? pack.reasonOut;
  return {
    ...pack,
    cellTypeId: install.cellTypeId,
    lotId: install.lotId ?? pack.lotId,
    madeOn: install.madeOn ?? pack.madeOn,
    removedAt,
    reasonOut: removedAt ? (reason ?? "other") : null,
    voltageOutMv: install.voltageOutMv ?? pack.voltageOutMv,
    stoppedAt: install.stoppedAt ?? pack.stoppedAt,
    lookOut: install.look ?? pack.lookOut,
  };
}

/** Where a removal is not told, the next install tells it. */
function closeOpenOnes(line: readonly Entry[]): void {
  line.forEach((entry, n) => {
    const next = line[n + 1];
    if (!next || next.row === null || entry.after.removedAt !== null) return;
    const reasonOut = entry.after.stoppedAt ? "found_stopped" : "other";
    entry.after = { ...entry.after, removedAt: next.after.installedAt, reasonOut };
  });
}

function refuseOverlaps(line: readonly Entry[], outcome: ImportOutcome): void {
  let last: WholePack | null = null;
  for (const { row, after } of line) {
    const end = last === null ? -Infinity : (last.removedAt?.getTime() ?? Infinity);
    if (after.installedAt.getTime() < end && row !== null) {
      const until = last?.removedAt ? "came out only later" : "is still in";
      outcome.refuse(row, "installed", `The pack before it ${until}: two packs cannot overlap.`);
      continue;
    }
    last = after;
  }
}

function settleLine(line: readonly Entry[], outcome: ImportOutcome): Entry[] {
  return line.filter((entry) => {
    const { row, isNew, before, after } = entry;
    const changes = before === null ? [] : differences(before, after);
    if (row === null) return changes.length > 0;
    if (outcome.isRefused(row)) return false;
    outcome.settle(
      row,
      isNew ? "new" : changes.length > 0 ? "changed" : "same",
      changes.join("; "),
    );
    return isNew || changes.length > 0;
  });
}

const TOLD: readonly (readonly [keyof WholePack, string])[] = [
  ["cellTypeId", "cells"],
  ["lotId", "lot"],
  ["madeOn", "made on"],
  ["removedAt", "removal"],
  ["reasonOut", "reason out"],
  ["voltageOutMv", "voltage out"],
  ["stoppedAt", "stop"],
  ["lookOut", "look"],
];

function differences(before: WholePack, after: WholePack): string[] {
  const text = (value: unknown) => (value instanceof Date ? value.getTime() : (value ?? ""));
  return TOLD.filter(([key]) => text(before[key]) !== text(after[key])).map(([, label]) => label);
}

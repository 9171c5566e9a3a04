/** The three policies that are usual without forecasts. */
import type { PlannedTask } from "@/lib/planning/fleet";
import { BEFORE_WORK, type BenchField, type BenchPack } from "./field";
import { assetOf, type BenchAsset } from "./fleet";
import { roundsForWanted, type WantedVisit } from "./rounds";
import type { Policy } from "./week";

/** A visit that is called for is made unless nobody can go there. */
const MUST_MINOR = 40_000;

type Wish = "swap" | "read" | null;

function task(asset: BenchAsset, pack: BenchPack, kind: "swap" | "read") {
  const cells = kind === "swap" ? asset.cells : 0;
  const base: PlannedTask = {
    kind,
    assetId: asset.tag,
    packId: pack.key,
    cellTypeId: kind === "swap" ? asset.designation : null,
    cells,
  };
  return { ...base, asset };
}

interface Wishes {
  /** What makes a visit necessary. */
  readonly due: (asset: BenchAsset, pack: BenchPack) => Wish;
  /** What else is done there on that occasion. */
  readonly along: (asset: BenchAsset, pack: BenchPack) => Wish;
}

function wantedAt(
  field: BenchField,
  monday: number,
  siteId: string,
  { due, along }: Wishes,
): WantedVisit | null {
  const here = field.fleet.assetsAt.get(siteId) ?? [];
  const now = monday + BEFORE_WORK;
  const known = here.map((asset) => {
    const pack = field.packOf(asset.tag);
    const silent = field.isKnownSilent(asset.tag, now);
    return { asset, pack, silent, wish: silent ? ("swap" as const) : due(asset, pack) };
  });
  if (known.every(({ wish }) => wish === null)) return null;
  const tasks = known.flatMap(({ asset, pack, wish }) => {
    const kind = wish ?? along(asset, pack);
    return kind ? [task(asset, pack, kind)] : [];
  });
  const silenceMinorPerDay = known.reduce(
    (sum, { silent, asset }) => sum + (silent ? 24 * asset.silenceMinorPerHour : 0),
    0,
  );
  const laterMinor = MUST_MINOR + 7 * silenceMinorPerDay;
  return { siteId, tasks, silenceMinorPerDay, laterMinor };
}

function planBy(field: BenchField, monday: number, wishes: Wishes) {
  const wanted = [...field.fleet.assetsAt.keys()].flatMap(
    (siteId) => wantedAt(field, monday, siteId, wishes) ?? [],
  );
  return roundsForWanted(field, monday, wanted);
}

/** Nobody goes before a device is silent. */
export function runToFailure(): Policy {
  const nothing = () => null;
  return {
    name: "run-to-failure",
    plan: (field, monday) => planBy(field, monday, { due: nothing, along: nothing }),
  };
}

export interface Intervals {
  /** Days by device model; Infinity: never by age. */
  readonly days: ReadonlyMap<string, number>;
  /** A pack that comes due within so many days is swapped along. */
  readonly alongDays: number;
}

/** Every pack comes out at the age set for its device model. */
export function fixedInterval({ days, alongDays }: Intervals): Policy {
  const after = (monday: number, ahead: number) => (asset: BenchAsset, pack: BenchPack) =>
    monday + ahead - pack.installedAt >= (days.get(asset.model.code) ?? Infinity) ? "swap" : null;
  return {
    name: "fixed-interval",
    plan: (field, monday) =>
      planBy(field, monday, { due: after(monday, 7), along: after(monday, alongDays) }),
  };
}

export interface Inspections {
  readonly byModel: ReadonlyMap<string, { readonly everyDays: number; readonly belowMv: number }>;
  /** A pack whose look comes due within so many days is read along. */
  readonly alongDays: number;
}

function lastLook(pack: BenchPack): number {
  return pack.readings.at(-1)?.at ?? pack.installedAt;
}

/** Voltages are read on a routine; what reads below its model's threshold comes out at once. */
export function inspectionThreshold({ byModel, alongDays }: Inspections): Policy {
  const after = (monday: number, ahead: number) => (asset: BenchAsset, pack: BenchPack) => {
    const every = byModel.get(asset.model.code)?.everyDays ?? Infinity;
    return monday + ahead - lastLook(pack) >= every ? "read" : null;
  };
  return {
    name: "inspection-threshold",
    plan: (field, monday) =>
      planBy(field, monday, { due: after(monday, 7), along: after(monday, alongDays) }),
    swapsAt: (field, pack, reading) => {
      const { model } = assetOf(field.fleet, pack.tag);
      const below = byModel.get(model.code)?.belowMv ?? 0;
      return reading.kind === "resting" && reading.millivolts < below;
    },
  };
}

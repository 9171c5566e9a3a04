/** The start that every policy is given: the scenario after its three years, and what is known. */
import type { PackReading } from "@/lib/battery";
import { groupBy } from "@/lib/usecases/forecast-input";
import { takenIn } from "../../seed/history-rows";
import { buildScenario } from "../../simulate/scenario/build-scenario";
import type { ScenarioPack, ScenarioReading } from "../../simulate/scenario/field-log";
import { worldTime } from "../../simulate/scenario/local-time";
import type { Scenario } from "../../simulate/scenario/scenario";
import type { World } from "../../simulate/world";
import { BenchField, type BenchPack } from "./field";
import { fleetOf, type Fleet } from "./fleet";

/** A Tuesday; the first planned week begins on the Monday after. */
const NOW = new Date("2026-12-01T09:00:00Z");
const DAYS_TO_MONDAY = 6;
/** As scripts/seed has it. */
const DEMONSTRATION_SEED = 1;

export interface Start {
  readonly fleet: Fleet;
  readonly firstDay: number;
  readonly lastDay: number;
  /** The same world, packs and records each time it is called. */
  readonly open: () => BenchField;
}

function readingOf(r: ScenarioReading): PackReading {
  const { key, at, millivolts, kind, loadUa, temperatureDc, accuracyMv } = r;
  return { id: key, at: worldTime(at), millivolts, kind, loadUa, temperatureDc, accuracyMv };
}

function packOf(
  pack: ScenarioPack,
  readings: readonly PackReading[],
  lastHeard: number | undefined,
): BenchPack {
  const stopped = pack.stoppedAt ? worldTime(pack.stoppedAt) : null;
  return {
    key: pack.key,
    tag: pack.assetTag,
    designation: pack.designation,
    installedAt: worldTime(pack.installedAt),
    madeAt: pack.madeDay,
    readings: [...readings],
    silence:
      stopped === null
        ? null
        : { at: stopped, lastAliveAt: lastHeard ?? stopped - 0.05, knownAt: stopped },
    removedAt: pack.removedAt ? worldTime(pack.removedAt) : null,
  };
}

function drawChangesOf(s: Scenario): Map<string, number[]> {
  const changes = new Map<string, number[]>();
  for (const event of s.events) {
    if (event.kind !== "firmware_changed") continue;
    changes.set(event.assetTag, [...(changes.get(event.assetTag) ?? []), worldTime(event.at)]);
  }
  return changes;
}

function opener(s: Scenario, fleet: Fleet, firstDay: number): () => BenchField {
  const world: World = s.world.copy();
  const others = s.assets.filter((a) => a.state !== "stored" && !fleet.assets.has(a.tag));
  for (const { tag } of others) world.remove(tag);
  const readings = groupBy(
    takenIn(s).map((taken) => taken.reading),
    (r) => r.packKey,
  );
  const packs = s.packs.map((p) =>
    packOf(p, (readings.get(p.key) ?? []).map(readingOf), undefined),
  );
  const drawChanges = drawChangesOf(s);
  return () => {
    const own = packs.map((p) => ({ ...p, readings: [...p.readings] }));
    const installed = own.filter((p) => p.removedAt === null && fleet.assets.has(p.tag));
    const finished = own.filter((p) => p.removedAt !== null);
    const byTag = new Map(installed.map((p) => [p.tag, p]));
    return new BenchField(fleet, world.copy(), byTag, finished, drawChanges, firstDay);
  };
}

/** Lives through the scenario of a seed and takes its fleet, or a part of it, from there. */
export function startOf(seed: string, assets: number, years: number): Start {
  return startFrom(buildScenario(`policy/${seed}`, NOW), seed, assets, years);
}

/** The demonstration itself, whole. */
export function demonstration(): Start {
  return startFrom(buildScenario(DEMONSTRATION_SEED, NOW), "demonstration", Infinity, 1);
}

function startFrom(scenario: Scenario, seed: string, assets: number, years: number): Start {
  const firstDay = scenario.today + DAYS_TO_MONDAY;
  const lastDay = firstDay + Math.round(years * 365.25);
  const fleet = fleetOf(scenario, seed, assets, lastDay);
  return { fleet, firstDay, lastDay, open: opener(scenario, fleet, firstDay) };
}

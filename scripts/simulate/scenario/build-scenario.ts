import { createRng, type Rng } from "../prng";
import { FEN_CLIMATE } from "../weather";
import type { ScenarioAsset } from "./assets";
import { CELL_CATALOGUE } from "./cell-catalogue";
import { DEVICE_MODELS } from "./device-models";
import type { Field } from "./field";
import { type HistoryPlan, liveThrough, measureDraws, takeStock } from "./history";
import { localDay, TIME_ZONE, worldTime } from "./local-time";
import { openField } from "./open-field";
import type { Scenario } from "./scenario";
import { CREWS, hireStaff, type Staff } from "./staff";

const HISTORY_DAYS = 1_096;

/** What a demonstration must show at its moment: packs out, and packs that stop within 14 days. */
const WANTED = { out: [2, 8], soon: [20, 30] } as const;
const MOST_TRIES = 6;

function climateNormals(): number[] {
  return Array.from({ length: 12 }, (_, month) => {
    const phase = 2 * Math.PI * ((month + 0.5) / 12 - 203 / 365);
    return Math.round(10 * (FEN_CLIMATE.meanC + FEN_CLIMATE.amplitudeC * Math.cos(phase)));
  });
}

function planFor(now: Date): HistoryPlan {
  const today = localDay(now);
  return {
    firstDay: today - HISTORY_DAYS,
    now,
    today,
    firmware: { modelCode: "RG1", version: "2.4", firstDay: today - 240, days: 21, factor: 1.45 },
  };
}

function isWithin(count: number, [low, high]: readonly [number, number]): boolean {
  return count >= low && count <= high;
}

function showsEnough(field: Field, now: Date): boolean {
  const tags = [...field.log.installed.keys()];
  const out = tags.filter((tag) => field.world.stoppedAt(tag) !== null).length;
  const soon = tags.filter((tag) => {
    const stop = field.world.lookAhead(tag, 14);
    return stop !== null && stop > worldTime(now);
  }).length;
  return isWithin(out, WANTED.out) && isWithin(soon, WANTED.soon);
}

interface Lived {
  readonly field: Field;
  readonly assets: readonly ScenarioAsset[];
}

/** Lives through the years, with other dice where the end would not show what it must. */
function live(staff: Staff, plan: HistoryPlan, rng: Rng): Lived {
  for (let tries = 1; ; tries++) {
    const lived = openField(staff.technicians, plan, rng.fork(`dice ${tries}`));
    liveThrough(lived.field, plan);
    if (tries === MOST_TRIES || showsEnough(lived.field, plan.now)) return lived;
  }
}

function fromField({ field, assets }: Lived, plan: HistoryPlan): Omit<Scenario, "people"> {
  const { log, stores } = field;
  const lastHeard = takeStock(field, plan.now);
  const updated = log.events.filter((e) => e.kind === "firmware_changed");
  return {
    organisation: {
      name: "Quillmere Drainage Board",
      timeZone: TIME_ZONE,
      currency: "GBP",
      locale: "en-GB",
    },
    now: plan.now,
    today: plan.today,
    firstDay: plan.firstDay,
    district: field.district,
    crews: CREWS,
    technicians: field.technicians,
    absences: field.absences,
    cellTypes: CELL_CATALOGUE,
    models: DEVICE_MODELS,
    monthlyMeanDc: climateNormals(),
    sites: field.sites,
    assets,
    lots: stores.lots,
    stockMoves: stores.moves,
    stockCounts: stores.counts(),
    packs: log.packs,
    readings: log.readings,
    events: log.events,
    rounds: log.rounds,
    draws: measureDraws(field, plan.now),
    lastHeard,
    firmwareVersion: new Map(updated.map((e) => [e.assetTag, plan.firmware.version])),
    world: field.world,
  };
}

/**
 * Builds the scenario: three years ending at the moment `now`. Same seed and moment, same
 * scenario, on every machine. A few seconds of work.
 */
export function buildScenario(seed: string | number, now: Date): Scenario {
  const rng = createRng(`quillmere/${seed}`);
  const plan = planFor(now);
  const staff = hireStaff(rng.fork("staff"), plan.today);
  return { people: staff.people, ...fromField(live(staff, plan, rng), plan) };
}

import type { Rng } from "../prng";
import type { SiteKind } from "./device-model";
import type { District } from "./district";
import { FAMILY_NAMES, FIRST_WORDS, GIVEN_NAMES, KIND_WORDS } from "./fen-words";
import { distanceToLine, isInside, lineLength, type Point, pointAlong, toWgs84 } from "./geometry";
import type { Ticket } from "./staff";
import { type Bank, bankOf, inMere, riverY } from "./water";

export type Hazard =
  | "water"
  | "height"
  | "confined_space"
  | "roadside"
  | "explosive_atmosphere"
  | "lone_working"
  | "livestock"
  | "soft_ground";

export interface ScenarioSite {
  readonly code: string;
  readonly name: string;
  readonly kind: SiteKind;
  readonly at: Point;
  readonly latitude: number;
  readonly longitude: number;
  readonly bank: Bank;
  readonly noticeDays: number;
  /** Minutes past local midnight. */
  readonly hours: readonly [number, number] | null;
  readonly keyCode: string | null;
  readonly contact: {
    readonly name: string;
    readonly email: string;
    readonly phone: string;
  } | null;
  readonly closure: {
    readonly first: string;
    readonly last: string;
    readonly reason: string;
  } | null;
  readonly hazards: readonly Hazard[];
  readonly tickets: readonly Ticket[];
  readonly driveUpNotes: string;
}

const COUNTS: readonly (readonly [SiteKind, number])[] = [
  ["pump_house", 16],
  ["sluice", 128],
  ["culvert", 120],
  ["gauge_house", 34],
  ["bank", 120],
  ["field", 268],
  ["mast", 14],
];

const MOST_METRES_FROM_ROAD = 800;

function nearRoad(district: District, p: Point): boolean {
  return district.roads.roads.some((r) => distanceToLine(p, r.line) < MOST_METRES_FROM_ROAD);
}

function aside(p: Point, metres: number, rng: Rng): Point {
  const angle = rng.uniform(0, 2 * Math.PI);
  return { x: p.x + metres * Math.cos(angle), y: p.y + metres * Math.sin(angle) };
}

function draftPlace(kind: SiteKind, district: District, rng: Rng, index: number): Point {
  if (kind === "pump_house") return (district.pumpHouses[index] as { at: Point }).at;
  if (kind === "bank") {
    const x = rng.uniform(300, 29_700);
    return { x, y: riverY(x) + rng.pick([-1, 1]) * rng.uniform(70, 160) };
  }
  if (kind === "gauge_house") {
    const x = rng.uniform(400, 29_600);
    return { x, y: riverY(x) + rng.pick([-1, 1]) * rng.uniform(90, 130) };
  }
  if (kind === "field" || kind === "mast") {
    return { x: rng.uniform(300, 29_700), y: rng.uniform(300, 24_700) };
  }
  const drain = rng.pick(district.drains.filter((d) => kind === "culvert" || d.class !== "lesser"));
  return aside(pointAlong(drain.line, rng.uniform(0, lineLength(drain.line))), 12, rng);
}

function findPlace(kind: SiteKind, district: District, rng: Rng, index: number): Point {
  for (let tries = 0; tries < 400; tries++) {
    const p = draftPlace(kind, district, rng, index);
    if (kind === "pump_house") return p;
    if (isInside(p) && !inMere(p, 60) && nearRoad(district, p)) return p;
  }
  throw new Error(`sites: no place for a ${kind} near a road`);
}

function nameSite(
  kind: SiteKind,
  pumpHouse: string | undefined,
  taken: Set<string>,
  rng: Rng,
): string {
  if (pumpHouse) return pumpHouse;
  for (;;) {
    const word = `${rng.pick(FIRST_WORDS)} ${rng.pick(KIND_WORDS[kind])}`;
    const before = rng.pick(["", "", "", "Upper ", "Nether ", "Far ", "Old ", "East ", "West "]);
    const name = `${before}${word}`;
    if (taken.has(name)) continue;
    taken.add(name);
    return name;
  }
}

const HAZARDS: Readonly<Record<SiteKind, readonly (readonly [Hazard, number])[]>> = {
  sluice: [
    ["water", 1],
    ["height", 0.25],
    ["lone_working", 0.3],
  ],
  culvert: [
    ["water", 0.9],
    ["confined_space", 0.12],
    ["roadside", 0.3],
  ],
  pump_house: [
    ["water", 1],
    ["explosive_atmosphere", 0.2],
    ["height", 0.3],
  ],
  field: [
    ["livestock", 0.2],
    ["soft_ground", 0.45],
    ["lone_working", 0.5],
  ],
  bank: [
    ["water", 1],
    ["soft_ground", 0.4],
    ["livestock", 0.15],
  ],
  gauge_house: [
    ["water", 0.8],
    ["lone_working", 0.2],
  ],
  mast: [
    ["height", 1],
    ["lone_working", 0.4],
  ],
};

function ticketsFor(kind: SiteKind, hazards: readonly Hazard[], rng: Rng): Ticket[] {
  const tickets: Ticket[] = [];
  if (hazards.includes("height") && (kind === "mast" || rng.chance(0.3))) tickets.push("height");
  if (hazards.includes("confined_space")) tickets.push("confined_space");
  if (hazards.includes("roadside")) tickets.push("roadside");
  if (kind === "bank" && rng.chance(0.05)) tickets.push("boat");
  return tickets;
}

const NOTES = [
  "",
  "",
  "",
  "Turn in by the second gate; leave it as found.",
  "Last 200 m on foot when wet.",
  "Park on the hard standing, not on the bank.",
  "Ring before noon.",
  "Low branch over the track: 2.6 m.",
  "Track floods when the drain is up; come from the other end.",
  "Bull in the field from May.",
];

const CLOSURES = [
  { first: "03-15", last: "07-15", reason: "nesting season" },
  { first: "07-20", last: "09-10", reason: "harvest" },
  { first: "12-20", last: "01-06", reason: "yard closed over the holidays" },
];

function contact(rng: Rng): ScenarioSite["contact"] {
  const given = rng.pick(GIVEN_NAMES);
  const family = rng.pick(FAMILY_NAMES);
  const email = `${given}.${family}@holdings.example`.toLowerCase();
  // 01632 960000-960999 is kept by the United Kingdom's regulator for invented numbers.
  return {
    name: `${given} ${family}`,
    email,
    phone: `01632 960${String(rng.int(0, 999)).padStart(3, "0")}`,
  };
}

function access(
  kind: SiteKind,
  rng: Rng,
): Pick<ScenarioSite, "noticeDays" | "hours" | "keyCode" | "contact" | "closure"> {
  const needsNotice = rng.chance(kind === "field" ? 0.2 : 0.07);
  const noticeDays = needsNotice ? rng.pick([1, 2, 3, 5, 7, 10]) : 0;
  const locked = rng.chance(kind === "pump_house" || kind === "gauge_house" ? 0.9 : 0.2);
  return {
    noticeDays,
    hours: rng.chance(0.06)
      ? rng.pick([
          [8 * 60, 16 * 60],
          [9 * 60, 15 * 60],
          [7 * 60, 12 * 60],
        ] as const)
      : null,
    keyCode: locked ? `K${rng.int(1, 38)}` : null,
    contact: needsNotice || rng.chance(0.15) ? contact(rng) : null,
    closure: rng.chance(kind === "field" || kind === "bank" ? 0.06 : 0.015)
      ? rng.pick(CLOSURES)
      : null,
  };
}

/** About 700 sites of the district: near a drain, the river or a field, and never far from a road. */
export function placeSites(district: District, rng: Rng): ScenarioSite[] {
  const taken = new Set<string>();
  const sites: ScenarioSite[] = [];
  for (const [kind, count] of COUNTS) {
    for (let i = 0; i < count; i++) {
      const at = findPlace(kind, district, rng, i);
      const pumpHouse = kind === "pump_house" ? district.pumpHouses[i]?.name : undefined;
      const hazards = HAZARDS[kind].filter(([, chance]) => rng.chance(chance)).map(([h]) => h);
      const bank = bankOf(at);
      sites.push({
        code: `${bank === "north" ? "N" : "S"}${String(sites.length + 1).padStart(3, "0")}`,
        name: nameSite(kind, pumpHouse, taken, rng),
        kind,
        at,
        ...toWgs84(at),
        bank,
        ...access(kind, rng),
        hazards,
        tickets: ticketsFor(kind, hazards, rng),
        driveUpNotes: rng.pick(NOTES),
      });
    }
  }
  return sites;
}

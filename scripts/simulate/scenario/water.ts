import type { Rng } from "../prng";
import { DISTRICT_HEIGHT_M, DISTRICT_WIDTH_M, type Line, type Point } from "./geometry";
import { DRAIN_NAMES, LODE_NAMES } from "./fen-words";

export interface Drain {
  readonly name: string;
  readonly class: "main" | "cross" | "lesser";
  readonly bank: Bank;
  readonly line: Line;
}

export type Bank = "north" | "south";

export interface Mere {
  readonly name: string;
  readonly centre: Point;
  readonly radiusX: number;
  readonly radiusY: number;
}

export const MERE: Mere = {
  name: "Quill Mere",
  centre: { x: 9_300, y: 16_900 },
  radiusX: 1_700,
  radiusY: 1_150,
};

/** Height of the River Quill's middle line at an easting. */
export function riverY(x: number): number {
  return (
    12_300 + 1_500 * Math.sin((2 * Math.PI * x) / 19_000 + 0.6) + 420 * Math.sin(x / 1_250 + 2)
  );
}

export function bankOf(p: Point): Bank {
  return p.y >= riverY(p.x) ? "north" : "south";
}

export function riverLine(): Point[] {
  const points: Point[] = [];
  for (let x = 0; x <= DISTRICT_WIDTH_M; x += 300) points.push({ x, y: riverY(x) });
  return points;
}

/** True within the mere, widened by `margin` metres. */
export function inMere(p: Point, margin = 0): boolean {
  const dx = (p.x - MERE.centre.x) / (MERE.radiusX + margin);
  const dy = (p.y - MERE.centre.y) / (MERE.radiusY + margin);
  return dx * dx + dy * dy < 1;
}

export function mereRing(rng: Rng): Point[] {
  const ring = Array.from({ length: 36 }, (_, i) => {
    const angle = (2 * Math.PI * i) / 36;
    const r = 1 + 0.05 * Math.sin(3 * angle) + rng.uniform(-0.03, 0.03);
    return {
      x: MERE.centre.x + MERE.radiusX * r * Math.cos(angle),
      y: MERE.centre.y + MERE.radiusY * r * Math.sin(angle),
    };
  });
  return [...ring, ring[0] as Point];
}

interface MainDrain {
  readonly bank: Bank;
  readonly at: (offset: number) => Point;
  readonly reach: number;
}

/** Main drains run from the far edge to the river, each a little aslant. */
function mainDrains(rng: Rng, bank: Bank): MainDrain[] {
  const side = bank === "north" ? 1 : -1;
  return Array.from({ length: 8 }, (_, i) => {
    const x0 = 1_700 + 3_800 * i + rng.uniform(-350, 350);
    const slant = rng.uniform(-0.1, 0.1);
    const edge = bank === "north" ? DISTRICT_HEIGHT_M - 500 : 500;
    return {
      bank,
      at: (offset: number) => ({ x: x0 + slant * offset, y: riverY(x0) + side * offset }),
      reach: Math.abs(edge - riverY(x0)),
    };
  });
}

const CROSS_OFFSETS = [1_750, 3_700, 6_100, 8_500];

function betweenMains(a: MainDrain, b: MainDrain, rng: Rng, names: string[]): Drain[] {
  const drains: Drain[] = [];
  for (const offset of CROSS_OFFSETS) {
    if (offset > Math.min(a.reach, b.reach)) continue;
    const line = [a.at(offset), b.at(Math.min(b.reach, offset + rng.uniform(-300, 300)))];
    if (line.some((p) => inMere(p, 200))) continue;
    drains.push({ name: names.pop() ?? "Cross drain", class: "cross", bank: a.bank, line });
  }
  for (let offset = 900; offset < Math.min(a.reach, b.reach) - 400; offset += 1_450) {
    const from = a.at(offset + rng.uniform(-250, 250));
    const share = rng.uniform(0.35, 0.6);
    const to = {
      x: from.x + (b.at(offset).x - from.x) * share,
      y: from.y + rng.uniform(-200, 200),
    };
    if ([from, to].some((p) => inMere(p, 200))) continue;
    drains.push({ name: "", class: "lesser", bank: a.bank, line: [from, to] });
  }
  return drains;
}

/** Every drain of the district: mains to the river, cross drains between them, lesser ones. */
export function layDrains(rng: Rng): Drain[] {
  const lodes = rng.shuffle(LODE_NAMES);
  const crossings = rng.shuffle(DRAIN_NAMES);
  const drains: Drain[] = [];
  for (const bank of ["north", "south"] as const) {
    const mains = mainDrains(rng, bank);
    for (const main of mains) {
      const offsets = [0, 0.25, 0.5, 0.75, 1].map((share) => share * main.reach);
      const line = offsets.map(main.at).filter((p) => !inMere(p, 150));
      drains.push({ name: lodes.pop() ?? "Lode", class: "main", bank, line });
    }
    mains.slice(1).forEach((b, i) => {
      drains.push(...betweenMains(mains[i] as MainDrain, b, rng, crossings));
    });
  }
  return drains;
}

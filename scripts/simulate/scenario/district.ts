import { createRng, type Rng } from "../prng";
import { VILLAGE_NAMES } from "./fen-words";
import { distance, type Point } from "./geometry";
import { layRoads, type RoadNet } from "./roads";
import { type Bank, type Drain, inMere, layDrains, mereRing, riverLine, riverY } from "./water";

export interface Place {
  readonly name: string;
  readonly at: Point;
}

export interface DepotPlace extends Place {
  readonly bank: Bank;
}

/** The invented district: one and the same for every seed of the scenario. */
export interface District {
  readonly river: readonly Point[];
  readonly mere: readonly Point[];
  readonly drains: readonly Drain[];
  readonly roads: RoadNet;
  readonly villages: readonly (Place & { readonly ring: readonly Point[] })[];
  readonly depots: readonly DepotPlace[];
  readonly pumpHouses: readonly Place[];
  readonly fields: readonly { readonly crop: string; readonly ring: readonly Point[] }[];
}

const CROPS = ["grass", "wheat", "beet", "potatoes", "reed", "fallow"];

function blob(centre: Point, radius: number, rng: Rng): Point[] {
  const ring = Array.from({ length: 10 }, (_, i) => {
    const r = radius * rng.uniform(0.75, 1.2);
    const angle = (2 * Math.PI * i) / 10;
    return { x: centre.x + r * Math.cos(angle), y: centre.y + r * Math.sin(angle) };
  });
  return [...ring, ring[0] as Point];
}

function settleVillages(net: RoadNet, rng: Rng): District["villages"] {
  const chosen: Place[] = [];
  for (const junction of rng.shuffle(net.junctions)) {
    const name = VILLAGE_NAMES[chosen.length];
    if (!name) break;
    if (chosen.some((v) => distance(v.at, junction.at) < 4_200)) continue;
    chosen.push({ name, at: junction.at });
  }
  return chosen.map((v) => ({ ...v, ring: blob(v.at, rng.uniform(220, 420), rng) }));
}

function depotAt(net: RoadNet, name: string, bank: Bank, near: Point): DepotPlace {
  const sorted = [...net.junctions]
    .filter((j) => j.at.y > riverY(j.at.x) === (bank === "north"))
    .sort((a, b) => distance(a.at, near) - distance(b.at, near));
  const at = sorted[0]?.at ?? near;
  return { name, bank, at: { x: at.x + 60, y: at.y + (bank === "north" ? 60 : -60) } };
}

/** A quadrilateral patch between four corners of a cell, split in `count` strips. */
function strips(
  x: number,
  y: number,
  width: number,
  height: number,
  count: number,
  rng: Rng,
): Point[][] {
  return Array.from({ length: count }, (_, i) => {
    const left = x + (width / count) * i + 30;
    const right = x + (width / count) * (i + 1) - 30;
    const jitter = (): number => rng.uniform(-40, 40);
    const a = { x: left + jitter(), y: y + 40 + jitter() };
    return [
      a,
      { x: right + jitter(), y: y + 40 + jitter() },
      { x: right + jitter(), y: y + height - 40 + jitter() },
      { x: left + jitter(), y: y + height - 40 + jitter() },
      a,
    ];
  });
}

function layFields(rng: Rng): District["fields"] {
  const fields: { crop: string; ring: Point[] }[] = [];
  for (let x = 500; x < 28_500; x += 1_900) {
    for (let y = 600; y < 23_000; y += 1_700) {
      const middle = { x: x + 850, y: y + 750 };
      const nearRiver = Math.abs(middle.y - riverY(middle.x)) < 1_300;
      if (nearRiver || inMere(middle, 1_300) || rng.chance(0.12)) continue;
      for (const ring of strips(x, y, 1_750, 1_500, rng.int(1, 3), rng)) {
        fields.push({ crop: rng.pick(CROPS), ring });
      }
    }
  }
  return fields;
}

/** Draws the district. Always the same: its seed is part of the drawing. */
export function drawDistrict(): District {
  const rng = createRng("quillmere-district");
  const drains = layDrains(rng.fork("drains"));
  const roads = layRoads(rng.fork("roads"));
  const mains = drains.filter((d) => d.class === "main");
  return {
    river: riverLine(),
    mere: mereRing(rng.fork("mere")),
    drains,
    roads,
    villages: settleVillages(roads, rng.fork("villages")),
    depots: [
      depotAt(roads, "North bank depot", "north", { x: 12_500, y: riverY(12_500) + 400 }),
      depotAt(roads, "South bank depot", "south", { x: 18_000, y: riverY(18_000) - 400 }),
    ],
    pumpHouses: mains.map((d) => {
      const foot = d.line[0] as Point;
      const away = d.bank === "north" ? 90 : -90;
      return { name: `${d.name} Engine`, at: { x: foot.x + 25, y: foot.y + away } };
    }),
    fields: layFields(rng.fork("fields")),
  };
}

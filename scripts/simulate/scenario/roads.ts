import type { Rng } from "../prng";
import {
  distance,
  DISTRICT_HEIGHT_M,
  DISTRICT_WIDTH_M,
  isInside,
  type Line,
  lineLength,
  type Point,
} from "./geometry";
import { inMere, riverY } from "./water";

export type RoadClass = "trunk" | "road" | "lane" | "drove";

/** What a van makes on each class, km/h. Source: from memory. */
export const ROAD_SPEED_KMH: Readonly<Record<RoadClass, number>> = {
  trunk: 70,
  road: 58,
  lane: 42,
  drove: 22,
};

export interface Junction {
  readonly id: string;
  readonly at: Point;
}

/** One road between two junctions: an edge of the road graph. */
export interface Road {
  readonly id: string;
  readonly from: string;
  readonly to: string;
  readonly class: RoadClass;
  readonly bridge: boolean;
  readonly metres: number;
  readonly line: Line;
}

export interface RoadNet {
  readonly junctions: readonly Junction[];
  readonly roads: readonly Road[];
}

/** Distances of the rows of junctions from the river's middle, metres. */
const ROW_OFFSETS = [380, 2_350, 4_600, 6_900, 9_200, 11_400];
const COLUMNS = 15;
/** Columns at which the river can be crossed. */
const BRIDGES = new Set([2, 7, 11]);
const ROW_CLASS: readonly RoadClass[] = ["trunk", "lane", "road", "lane", "lane", "lane"];

interface Lattice {
  readonly at: (column: number, row: number) => Junction | undefined;
  readonly all: Junction[];
}

/** Rows 0..5 lie north of the river, −1..−6 south of it. */
const ROWS = [-6, -5, -4, -3, -2, -1, 0, 1, 2, 3, 4, 5];

function lattice(rng: Rng): Lattice {
  const found = new Map<string, Junction>();
  for (let column = 0; column < COLUMNS; column++) {
    for (const row of ROWS) {
      const band = row >= 0 ? row : -row - 1;
      const near = band === 0;
      const x = 700 + ((DISTRICT_WIDTH_M - 1_400) / (COLUMNS - 1)) * column;
      const at = {
        x: x + rng.uniform(-1, 1) * (near ? 150 : 380),
        y:
          riverY(x) +
          (row >= 0 ? 1 : -1) * (ROW_OFFSETS[band] as number) +
          rng.uniform(-1, 1) * (near ? 50 : 330),
      };
      if (!isInside(at) || at.y > DISTRICT_HEIGHT_M - 400 || at.y < 400 || inMere(at, 250))
        continue;
      found.set(`${column}:${row}`, { id: `J${String(found.size + 1).padStart(3, "0")}`, at });
    }
  }
  return { at: (column, row) => found.get(`${column}:${row}`), all: [...found.values()] };
}

function bend(a: Point, b: Point, rng: Rng): Point[] {
  const length = distance(a, b);
  return [0.33, 0.67].map((share) => {
    const aside = rng.uniform(-0.06, 0.06) * length;
    return {
      x: a.x + (b.x - a.x) * share - ((b.y - a.y) / length) * aside,
      y: a.y + (b.y - a.y) * share + ((b.x - a.x) / length) * aside,
    };
  });
}

function alongRiver(a: Point, b: Point, side: number): Point[] {
  return [0.25, 0.5, 0.75].map((share) => {
    const x = a.x + (b.x - a.x) * share;
    return { x, y: riverY(x) + side * 380 };
  });
}

interface Draft {
  readonly from: Junction;
  readonly to: Junction;
  readonly class: RoadClass;
  readonly bridge: boolean;
  readonly line: Line;
}

function draftRoads(net: Lattice, rng: Rng): Draft[] {
  const drafts: Draft[] = [];
  const add = (
    from: Junction | undefined,
    to: Junction | undefined,
    kind: RoadClass,
    bridge: boolean,
    via?: Point[],
  ): void => {
    if (!from || !to) return;
    const line = [from.at, ...(via ?? bend(from.at, to.at, rng)), to.at];
    if (!line.some((p) => inMere(p, 80))) drafts.push({ from, to, class: kind, bridge, line });
  };
  for (let column = 0; column < COLUMNS; column++) {
    for (const row of ROWS) {
      const here = net.at(column, row);
      const next = net.at(column + 1, row);
      const band = row >= 0 ? row : -row - 1;
      const river =
        band === 0 && here && next ? alongRiver(here.at, next.at, row >= 0 ? 1 : -1) : undefined;
      add(here, next, ROW_CLASS[band] as RoadClass, false, river);
      const crossing = row === -1;
      if (crossing && !BRIDGES.has(column)) continue;
      const kind = crossing || BRIDGES.has(column) ? "road" : rng.chance(0.45) ? "drove" : "lane";
      add(here, net.at(column, row + 1), kind, crossing, crossing ? [] : undefined);
    }
  }
  return drafts;
}

/** Joins sets of junctions; `join` is false when both were joined already. */
function unionFind(): (a: string, b: string) => boolean {
  const parent = new Map<string, string>();
  const root = (id: string): string => {
    const up = parent.get(id) ?? id;
    if (up === id) return id;
    const top = root(up);
    parent.set(id, top);
    return top;
  };
  return (a, b) => {
    const [ra, rb] = [root(a), root(b)];
    if (ra === rb) return false;
    parent.set(ra, rb);
    return true;
  };
}

/**
 * A connected road graph: a trunk road on each bank, roads, lanes and droves behind them, and
 * three bridges. A fifth of the lanes and droves are left out where the net stays connected.
 */
export function layRoads(rng: Rng): RoadNet {
  const net = lattice(rng);
  const drafts = draftRoads(net, rng);
  const lasting = new Set(drafts.filter((d) => d.class === "trunk" || d.class === "road"));
  for (const draft of drafts) if (rng.chance(0.78)) lasting.add(draft);
  const join = unionFind();
  for (const draft of lasting) join(draft.from.id, draft.to.id);
  for (const draft of drafts) if (join(draft.from.id, draft.to.id)) lasting.add(draft);
  const roads = drafts
    .filter((draft) => lasting.has(draft))
    .map((draft, i) => ({
      id: `R${String(i + 1).padStart(3, "0")}`,
      from: draft.from.id,
      to: draft.to.id,
      class: draft.class,
      bridge: draft.bridge,
      metres: Math.round(lineLength(draft.line)),
      line: draft.line,
    }));
  return { junctions: net.all, roads };
}

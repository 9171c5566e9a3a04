/** Random small routing problems for tests: every rule of the model, from one seed. */
import type { Problem, Site, Slot } from "../../../lib/routing/problem";
import { seededRng, type Rng } from "../../../lib/routing/rng";

export interface Shape {
  readonly sites: number;
  readonly days: number;
  readonly technicians: number;
  /** Breaks stand on the wall clock; the MILP of the exact tests has none. */
  readonly breaks: boolean;
  /** Stores hold too little for everybody, and a delivery comes on the last day. */
  readonly stock?: boolean;
}

const HOUR = 3600;

function randomSite(rng: Rng, i: number, shape: Shape, slots: number): Site {
  const days = Array.from({ length: shape.days }, (_, day) => day);
  const openS = (8 + rng.below(4)) * HOUR;
  const locked = rng.below(8) === 0;
  const previous = rng.below(3) === 0;
  return {
    id: `S${i}`,
    place: 2 + i,
    serviceS: 600 + rng.below(2400),
    windows: days.map(() =>
      rng.below(5) === 0 ? null : { openS, closeS: openS + (1 + rng.below(7)) * HOUR },
    ),
    visitCost: days.map(() => rng.below(4000)),
    skipCost: rng.below(3) === 0 ? 0 : 3000 + rng.below(15_000),
    must: rng.below(6) === 0,
    skills: rng.below(4) === 0 ? 1 : 0,
    demand: [rng.below(4), rng.below(3)],
    firstDay: rng.below(4) === 0 ? 1 : 0,
    ...(locked && { lockedTo: rng.below(slots) }),
    ...(previous && {
      previous: { slot: rng.below(slots), dayCost: 900, technicianCost: 700, dropCost: 500 },
    }),
  };
}

function randomSlot(rng: Rng, day: number, technician: number, breaks: boolean): Slot {
  const startS = (7 + rng.below(3)) * HOUR;
  return {
    id: `T${technician}D${day}`,
    technician,
    day,
    startPlace: technician % 2,
    endPlace: rng.below(4) === 0 ? 1 - (technician % 2) : technician % 2,
    startS,
    endS: startS + (4 + rng.below(4)) * HOUR,
    overtimeS: rng.below(2) * HOUR,
    overtimePerS: 2,
    breaks: breaks ? [{ openS: 12 * HOUR, closeS: 12 * HOUR + 1800 }] : [],
    capacity: [6, 5],
    capacityTotal: 9,
    skills: rng.below(2),
    openingCost: rng.below(2) * 1500,
    frozen: [],
  };
}

function randomStock(seed: number, shape: Shape): number[][] {
  const rng = seededRng(seed + 7_777);
  return [0, 1].map(() => {
    const first = rng.below(Math.max(2, shape.sites));
    const delivered = rng.below(4);
    return Array.from({ length: shape.days }, (_, day) =>
      day < shape.days - 1 ? first : first + delivered,
    );
  });
}

/** Places 0 and 1 are depots; travel is metric but not symmetric. */
export function randomProblem(seed: number, shape: Shape): Problem {
  const rng = seededRng(seed);
  const places = 2 + shape.sites;
  const points = Array.from({ length: places }, () => [rng.below(4000), rng.below(4000)] as const);
  const travelS = points.flatMap((a) =>
    points.map((b) => Math.ceil(Math.hypot(a[0] - b[0], a[1] - b[1]) + (b[1] > a[1] ? 60 : 0))),
  );
  const slots = Array.from({ length: shape.days * shape.technicians }, (_, r) =>
    randomSlot(rng, Math.floor(r / shape.technicians), r % shape.technicians, shape.breaks),
  );
  return {
    days: shape.days,
    cellTypes: 2,
    sites: Array.from({ length: shape.sites }, (_, i) => randomSite(rng, i, shape, slots.length)),
    slots,
    places,
    travelS,
    travelM: travelS.map((seconds) => seconds * 14),
    ...(shape.stock && { stock: randomStock(seed, shape) }),
    prices: { drivingPerS: 1, dutyPerS: rng.below(2), perM: rng.below(2) },
  };
}

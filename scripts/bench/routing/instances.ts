/**
 * Readers of public instance formats, into the engine's problem:
 * Solomon / Gehring & Homberger text (VRPTW), VRPLIB text with PRIZE_SECTION (prize-collecting
 * VRPTW) and the project's multi-day technician JSON.
 */
import type { Problem, Site, Slot } from "../../../lib/routing/problem";

export interface Instance {
  readonly set: string;
  readonly name: string;
  readonly problem: Problem;
  /** Cost of the engine divided by this is the cost of the tables. */
  readonly scale: number;
}

interface Point {
  readonly x: number;
  readonly y: number;
}

/** Customer rows in ×10 integers, depot first. */
interface Row extends Point {
  readonly demand: number;
  readonly openS: number;
  readonly closeS: number;
  readonly serviceS: number;
  /** Undefined: must be visited. */
  readonly prize?: number;
}

/** Euclidean distances ×10, cut off (the DIMACS challenge's convention of one decimal). */
function tenths(points: readonly Point[]): Int32Array {
  const side = points.length;
  const out = new Int32Array(side * side);
  points.forEach((a, i) =>
    points.forEach((b, j) => {
      out[i * side + j] = Math.floor(10 * Math.sqrt((a.x - b.x) ** 2 + (a.y - b.y) ** 2));
    }),
  );
  return out;
}

function oneDay(rows: readonly Row[], vehicles: number, capacity: number): Problem {
  const depot = rows[0];
  if (!depot) throw new Error("no depot in the instance");
  const sites = rows.slice(1).map((row, i): Site => ({
    id: String(i + 1),
    place: i + 1,
    serviceS: row.serviceS,
    windows: [{ openS: row.openS, closeS: row.closeS }],
    visitCost: [0],
    skipCost: row.prize ?? 0,
    must: row.prize === undefined,
    skills: 0,
    demand: [row.demand],
    firstDay: 0,
  }));
  const slots = Array.from({ length: vehicles }, (_, k): Slot => ({
    ...{ id: `v${k}`, technician: k, day: 0, startPlace: 0, endPlace: 0 },
    ...{ startS: depot.openS, endS: depot.closeS, overtimeS: 0, overtimePerS: 0, breaks: [] },
    ...{ capacity: [capacity], capacityTotal: capacity, skills: 0, openingCost: 0, frozen: [] },
  }));
  const travelS = tenths(rows);
  const prices = { drivingPerS: 1, dutyPerS: 0, perM: 0 };
  return {
    days: 1,
    cellTypes: 1,
    sites,
    slots,
    places: rows.length,
    travelS,
    travelM: travelS,
    prices,
  };
}

/** Solomon's layout: NUMBER CAPACITY, then rows of 7 numbers, the depot first. */
export function readSolomon(text: string): Problem {
  const lines = text.split(/\r?\n/).map((line) => line.trim().split(/\s+/).map(Number));
  const fleet = lines.find((numbers) => numbers.length === 2 && numbers.every(Number.isFinite));
  const rows = lines.filter((numbers) => numbers.length === 7 && numbers.every(Number.isFinite));
  const vehicles = fleet?.[0];
  const capacity = fleet?.[1];
  if (vehicles === undefined || capacity === undefined) throw new Error("no vehicle line");
  const customers = rows.map(([, x, y, demand, ready, due, service]) => ({
    x: x!,
    y: y!,
    demand: demand!,
    openS: 10 * ready!,
    closeS: 10 * due!,
    serviceS: 10 * service!,
  }));
  return oneDay(customers, vehicles, capacity);
}

function vrplibSections(text: string): Map<string, string[]> {
  const sections = new Map<string, string[]>();
  let name = "";
  for (const line of text.split(/\r?\n/).map((raw) => raw.trim())) {
    const header = /^([A-Z_]+)\s*(?::\s*(.*))?$/.exec(line);
    if (header?.[1] && !/^-?\d/.test(line)) {
      name = header[1];
      sections.set(name, header[2] === undefined ? [] : [header[2]]);
    } else if (line !== "") sections.get(name)?.push(line);
  }
  return sections;
}

/** VRPLIB text; with a PRIZE_SECTION every customer is optional. Times and prizes become ×10. */
export function readVrplib(text: string): Problem {
  const sections = vrplibSections(text);
  const table = (name: string) =>
    (sections.get(name) ?? []).map((line) => line.split(/\s+/).map(Number));
  const single = (name: string, otherwise: number) => Number(sections.get(name)?.[0] ?? otherwise);
  const demand = table("DEMAND_SECTION");
  const windows = table("TIME_WINDOW_SECTION");
  const services = table("SERVICE_TIME_SECTION");
  const prizes = table("PRIZE_SECTION");
  const service = single("SERVICE_TIME", 0);
  const rows = table("NODE_COORD_SECTION").map(([, x, y], i): Row => ({
    x: x!,
    y: y!,
    demand: demand[i]?.[1] ?? 0,
    openS: 10 * (windows[i]?.[1] ?? 0),
    closeS: 10 * (windows[i]?.[2] ?? 10_000_000),
    serviceS: 10 * (services[i]?.[1] ?? service),
    ...(prizes[i]?.[1] !== undefined && { prize: Math.round(10 * prizes[i][1]) }),
  }));
  return oneDay(rows, single("VEHICLES", rows.length - 1), single("CAPACITY", 100_000_000));
}

interface FieldJson {
  readonly speedUnitsPerMinute: number;
  readonly days: number;
  readonly depots: readonly (readonly [number, number])[];
  readonly technicians: readonly {
    readonly id: number;
    readonly depot: number;
    readonly shift: readonly [number, number];
    readonly vanBatteries: number;
  }[];
  readonly clients: readonly {
    readonly id: number;
    readonly x: number;
    readonly y: number;
    readonly service: number;
    readonly batteries: number;
    readonly tw: readonly [number, number];
    readonly visitCost: readonly number[];
    readonly skipCost: number;
  }[];
}

function fieldSlots(data: FieldJson, day: number): Slot[] {
  return data.technicians.map((tech) => ({
    ...{ id: `t${tech.id}d${day}`, technician: tech.id, day },
    ...{ startPlace: tech.depot, endPlace: tech.depot },
    ...{ startS: tech.shift[0], endS: tech.shift[1], overtimeS: 0, overtimePerS: 0, breaks: [] },
    ...{ capacity: [tech.vanBatteries], capacityTotal: tech.vanBatteries },
    ...{ skills: 0, openingCost: 0, frozen: [] },
  }));
}

/** The multi-day technician format; its minutes serve as the engine's seconds. */
export function readField(text: string): Problem {
  const data = JSON.parse(text) as FieldJson;
  const points = [...data.depots.map(([x, y]) => ({ x, y })), ...data.clients];
  const places = points.length;
  const minutes = (a: Point, b: Point) =>
    Math.ceil(Math.sqrt((a.x - b.x) ** 2 + (a.y - b.y) ** 2) / data.speedUnitsPerMinute);
  const travelS = Int32Array.from(points.flatMap((a) => points.map((b) => minutes(a, b))));
  const days = Array.from({ length: data.days }, (_, day) => day);
  const sites = data.clients.map((client, i): Site => ({
    id: String(client.id),
    place: data.depots.length + i,
    serviceS: client.service,
    windows: days.map(() => ({ openS: client.tw[0], closeS: client.tw[1] })),
    visitCost: client.visitCost,
    skipCost: client.skipCost,
    must: false,
    skills: 0,
    demand: [client.batteries],
    firstDay: 0,
  }));
  const slots = days.flatMap((day) => fieldSlots(data, day));
  const prices = { drivingPerS: 1, dutyPerS: 0, perM: 0 };
  return { days: data.days, cellTypes: 1, sites, slots, places, travelS, travelM: travelS, prices };
}

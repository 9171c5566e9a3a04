/** Finds instances in a folder and its subfolders, with the best cost known for each. */
import { readdirSync, readFileSync } from "node:fs";
import { basename, extname, join } from "node:path";
import { readField, readSolomon, readVrplib, type Instance } from "./instances";

export interface Listed {
  readonly path: string;
  readonly set: string;
  readonly name: string;
}

/** Best costs seen for the field family (no proof; bks.csv of the folder goes before). */
const FIELD_BEST: ReadonlyMap<string, number> = new Map([
  ["field-60-5-1", 1019],
  ["field-200-10-3", 2721],
  ["field-500-15-5", 5755],
  ["field-1000-20-8", 10510],
]);

function filesUnder(folder: string): string[] {
  return readdirSync(folder, { withFileTypes: true })
    .sort((a, b) => a.name.localeCompare(b.name))
    .flatMap((entry) => {
      const path = join(folder, entry.name);
      return entry.isDirectory() ? filesUnder(path) : [path];
    });
}

/** The set an instance file belongs to, by its content; undefined for any other file. */
function setOf(path: string): string | undefined {
  const kind = extname(path);
  if (![".txt", ".vrp", ".json"].includes(kind)) return undefined;
  const text = readFileSync(path, "utf8");
  if (kind === ".json") return text.includes('"technicians"') ? "field" : undefined;
  if (kind === ".vrp") return text.includes("PRIZE_SECTION") ? "pcvrptw" : "vrplib";
  if (!/READY TIME/.test(text)) return undefined;
  const customers = text.match(/^\s*\d+(\s+-?[\d.]+){6}\s*$/gm)?.length ?? 0;
  return customers > 101 ? "homberger" : "solomon";
}

export function listInstances(folder: string, only: RegExp): Listed[] {
  return filesUnder(folder).flatMap((path) => {
    const name = basename(path, extname(path));
    if (!only.test(name)) return [];
    const set = setOf(path);
    return set ? [{ path, set, name }] : [];
  });
}

export function loadInstance({ path, set, name }: Listed): Instance {
  const text = readFileSync(path, "utf8");
  if (set === "field") return { set, name, problem: readField(text), scale: 1 };
  if (extname(path) === ".vrp") return { set, name, problem: readVrplib(text), scale: 1 };
  return { set, name, problem: readSolomon(text), scale: 10 };
}

/** Tables and file names differ in upper and lower case. */
export function nameInTable({ set, name }: Pick<Listed, "set" | "name">): string {
  return `${set}/${name}`.toLowerCase();
}

/** Best known costs by `nameInTable`, from every bks.csv of the folder. */
export function bestKnown(folder: string): Map<string, number> {
  const best = new Map([...FIELD_BEST].map(([name, cost]) => [`field/${name}`, cost]));
  for (const path of filesUnder(folder).filter((file) => basename(file) === "bks.csv")) {
    const lines = readFileSync(path, "utf8").split(/\r?\n/);
    const columns = (lines[0] ?? "").split(",");
    const [set, instance, cost] = ["set", "instance", "bks"].map((name) => columns.indexOf(name));
    for (const line of lines.slice(1)) {
      const cells = line.split(",");
      const value = Number(cells[cost!]);
      if (value > 0) best.set(nameInTable({ set: cells[set!]!, name: cells[instance!]! }), value);
    }
  }
  return best;
}

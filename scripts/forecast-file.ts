/**
 * A pack and its readings from a file. JSON: an object of `pack`, `readings` and so on with
 * dates as YYYY-MM-DD. CSV: lines `name,value` that describe the pack, an empty line, and a
 * table of readings with a header.
 */
import { parse } from "csv-parse/sync";
import { z } from "zod";
import { CHEMISTRIES, type ForecastInput } from "../lib/battery/pack";
import { type Fault, invalid } from "../lib/errors";
import { MS_PER_DAY } from "../lib/units";

const day = z.string().transform((text, context) => {
  const ms = /^\d{4}-\d{2}-\d{2}/.test(text) ? Date.parse(text) : Number.NaN;
  if (Number.isNaN(ms)) {
    context.addIssue("Give a date as 2026-03-31 or 2026-03-31T09:30Z.");
    return z.NEVER;
  }
  return ms / MS_PER_DAY;
});

const amount = z.number();
const optional = amount.nullable().default(null);

const point = z.object({
  currentUa: amount,
  cutoffMv: amount,
  temperatureDc: amount.default(200),
  capacityMah: amount,
});

const cell = z.object({
  chemistry: z.enum(CHEMISTRIES),
  nominalMv: amount,
  rated: point,
  capacityTable: z.array(point).default([]),
  selfDischargePpmPerYear: amount,
  resistanceMohm: amount,
  maxPulseUa: optional,
});

const pack = z.object({
  cell,
  series: amount,
  parallel: amount.default(1),
  cutoffMv: amount,
  duty: z
    .array(z.object({ name: z.string().default(""), currentUa: amount, durationMs: amount }))
    .default([]),
  measuredDraw: z.object({ averageUa: amount, relativeSd: amount }).nullable().default(null),
  monthlyMeanDc: z.array(amount).default(Array.from({ length: 12 }, () => 200)),
  madeAt: day.nullable().default(null),
  installedAt: day,
});

const reading = z.object({
  id: z.string().optional(),
  at: day,
  millivolts: amount,
  kind: z.enum(["resting", "loaded"]).default("resting"),
  loadUa: optional,
  temperatureDc: optional,
  accuracyMv: optional,
});

const event = z.object({
  at: day,
  kind: z.enum(["reporting", "stopped", "draw-changed"]),
  lastAliveAt: day.optional(),
});

const file = z.object({
  pack,
  readings: z.array(reading).default([]),
  events: z.array(event).default([]),
  now: day.optional(),
});

/** Read a file's text; throws `invalid` with every fault named. */
export function readForecastFile(text: string, name: string): ForecastInput {
  const raw = name.toLowerCase().endsWith(".csv") ? fromCsv(text) : fromJson(text);
  const parsed = file.safeParse(raw);
  if (!parsed.success) throw invalid(`${name} cannot be used.`, parsed.error.issues.map(toFault));
  const { readings, events, now, ...rest } = parsed.data;
  const dated = readings.map(({ id, ...r }) => ({
    id: id ?? new Date(r.at * MS_PER_DAY).toISOString().slice(0, 10),
    ...r,
  }));
  const last = [...dated, ...events].reduce((at, r) => Math.max(at, r.at), rest.pack.installedAt);
  const known = events.map(({ lastAliveAt, ...e }) =>
    lastAliveAt === undefined ? e : { ...e, lastAliveAt },
  );
  return { ...rest, readings: dated, events: known, prior: null, now: now ?? last };
}

function toFault(issue: z.core.$ZodIssue): Fault {
  const row = issue.path.find((part) => typeof part === "number");
  const field = issue.path.filter((part) => typeof part !== "number").join(".");
  return { field, message: issue.message, ...(row === undefined ? {} : { row: row + 1 }) };
}

function fromJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch (error) {
    const why = error instanceof Error ? error.message : String(error);
    throw invalid("The file is not JSON.", [{ field: "file", message: why }]);
  }
}

/** The pack's lines in the CSV's head, as they lie in the JSON. */
function packFromLines(lines: ReadonlyMap<string, string>): unknown {
  const number = (key: string): number | undefined => {
    const value = lines.get(key);
    return value === undefined || value === "" ? undefined : Number(value);
  };
  const rated = {
    currentUa: number("ratedCurrentUa"),
    cutoffMv: number("ratedCutoffMv"),
    temperatureDc: number("ratedTemperatureDc"),
    capacityMah: number("ratedCapacityMah"),
  };
  const averageUa = number("averageUa");
  const peakUa = number("peakUa") ?? averageUa;
  return {
    cell: {
      chemistry: lines.get("chemistry"),
      nominalMv: number("nominalMv"),
      rated,
      selfDischargePpmPerYear: number("selfDischargePpmPerYear"),
      resistanceMohm: number("resistanceMohm"),
    },
    series: number("series"),
    parallel: number("parallel"),
    cutoffMv: number("cutoffMv"),
    // a pulse too short to change the average
    duty: [
      { name: "average", currentUa: averageUa, durationMs: 1e9 },
      { name: "peak", currentUa: peakUa, durationMs: 1 },
    ],
    installedAt: lines.get("installedAt"),
  };
}

function fromCsv(text: string): unknown {
  const rows: string[][] = parse(text, { bom: true, relax_column_count: true, trim: true });
  const start = rows.findIndex((row) => row[0] === "at");
  if (start < 0) {
    throw invalid("The file holds no readings.", [
      { field: "at", message: "Begin the table of readings with a header: at,millivolts,kind,..." },
    ]);
  }
  const lines = new Map(rows.slice(0, start).map((row) => [row[0] ?? "", row[1] ?? ""]));
  const header = rows[start] ?? [];
  const text_ = new Set(["at", "kind", "id"]);
  const readings = rows.slice(start + 1).map((row) =>
    Object.fromEntries(
      header.flatMap((name, i) => {
        const value = row[i] ?? "";
        if (value === "") return [];
        return [[name, text_.has(name) ? value : Number(value)]];
      }),
    ),
  );
  return { pack: packFromLines(lines), readings, now: lines.get("now") };
}

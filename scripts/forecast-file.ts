/**
 * A pack and its readings from a file. JSON: an object of `pack`, `readings` and so on with
 * dates as YYYY-MM-DD. CSV: lines `name,value` that describe the pack, an empty line, and a
 * table of readings with a header.
 */
import { parse } from "csv-parse/sync";
import { z } from "zod";
import { packPeakUa } from "../lib/battery";
import {
  CHEMISTRIES,
  type ForecastInput,
  type PackEvent,
  type PackReading,
} from "../lib/battery/pack";
import { type Fault, invalid } from "../lib/errors";
import { MS_PER_DAY } from "../lib/units";

/** A date, a time of day and a zone, of which the later two may be missing; no zone means UTC. */
const WHEN =
  /^(\d{4}-\d{2}-\d{2})(?:[T ](\d{1,2}:\d{2}(?::\d{2}(?:\.\d+)?)?))?\s*(Z|[+-]\d{2}:?\d{2})?$/i;

function epochMs(text: string): number {
  const [, date, time = "00:00", zone = "Z"] = WHEN.exec(text.trim()) ?? [];
  if (!date) return Number.NaN;
  const ms = Date.parse(
    `${date}T${time.padStart(time.indexOf(":") === 1 ? time.length + 1 : 0, "0")}${zone.toUpperCase()}`,
  );
  // 30 February would otherwise become 2 March
  return new Date(Date.parse(date)).toISOString().startsWith(date) ? ms : Number.NaN;
}

const day = z.string().transform((text, context) => {
  const ms = epochMs(text);
  if (Number.isNaN(ms)) {
    context.addIssue("Give a date as 2026-03-31, 2026-03-31 09:30 or 2026-03-31T09:30+02:00.");
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
  const dated = named(readings);
  const last = [...dated, ...events].reduce((at, r) => Math.max(at, r.at), rest.pack.installedAt);
  const known = events.map(({ lastAliveAt, ...e }) =>
    lastAliveAt === undefined ? e : { ...e, lastAliveAt },
  );
  const input = { ...rest, readings: dated, events: known, prior: null, now: now ?? last };
  return { ...input, events: [...known, ...heldUp(input)] };
}

/** Readings without an id are called by their time, told apart where two share it. */
function named(readings: readonly (Omit<PackReading, "id"> & { id?: string | undefined })[]) {
  const taken = new Map<string, number>();
  return readings.map(({ id, ...reading }): PackReading => {
    const time = timeText(reading.at, reading.at % 1 !== 0);
    const count = (taken.get(time) ?? 0) + 1;
    taken.set(time, count);
    return { id: id ?? (count > 1 ? `${time} (${count})` : time), ...reading };
  });
}

/** A day since the epoch as text, UTC, with the time of day where it matters. */
export function timeText(epochDays: number, withTime: boolean): string {
  const text = new Date(Math.round(epochDays * MS_PER_DAY)).toISOString();
  return withTime ? text.slice(0, 16).replace("T", " ") : text.slice(0, 10);
}

/** A voltage above the cut-off under the device's own peak: it ran at that moment. */
function heldUp({ pack, readings, now }: ForecastInput): PackEvent[] {
  const peak = packPeakUa(pack);
  const held = readings.filter(
    (r) =>
      r.kind === "loaded" &&
      r.millivolts > pack.cutoffMv &&
      (r.loadUa ?? peak) >= peak &&
      r.at >= pack.installedAt &&
      r.at <= now,
  );
  const last = held.reduce((at, r) => Math.max(at, r.at), -Infinity);
  return held.length > 0 ? [{ at: last, kind: "reporting" }] : [];
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
    monthlyMeanDc: yearOf(number("temperatureDc")),
    madeAt: lines.get("madeAt") || undefined,
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

/** One temperature all the year; left out, the file's default holds. */
const yearOf = (dc: number | undefined): number[] | undefined =>
  dc === undefined ? undefined : Array.from({ length: 12 }, () => dc);

/** Columns by the names they should have, whatever their case; those of other names are kept. */
const COLUMNS = [
  "at",
  "millivolts",
  "kind",
  "loadUa",
  "temperatureDc",
  "accuracyMv",
  "id",
] as const;

const column = (text: string): string =>
  COLUMNS.find((name) => name.toLowerCase() === text.toLowerCase()) ?? text;

/** Rows of a CSV parted by commas, semicolons or tabs, whichever its table's header has most of. */
function parseRows(text: string): string[][] {
  const line = text.split(/\r?\n/).find((one) => /(^|[,;\t])\s*at\s*([,;\t]|$)/i.test(one)) ?? "";
  const count = (mark: string): number => line.split(mark).length;
  const delimiter = [",", ";", "\t"].reduce((a, b) => (count(b) > count(a) ? b : a));
  try {
    return parse(text, { bom: true, delimiter, relax_column_count: true, trim: true });
  } catch (error) {
    const why = error instanceof Error ? error.message : String(error);
    throw invalid("The file is not CSV.", [{ field: "file", message: why }]);
  }
}

function fromCsv(text: string): unknown {
  const rows = parseRows(text);
  const start = rows.findIndex((row) => row.some((cell) => column(cell) === "at"));
  const header = (rows[start] ?? []).map(column);
  for (const needed of ["at", "millivolts"]) {
    if (header.includes(needed)) continue;
    throw invalid("The file holds no readings.", [
      {
        field: needed,
        message: "Begin the table of readings with a header: at,millivolts,kind,...",
      },
    ]);
  }
  const lines = new Map(rows.slice(0, start).map((row) => [row[0] ?? "", row[1] ?? ""]));
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

/**
 * A pack and its readings from a file, JSON or CSV (`forecast-csv.ts`). JSON: an object of `pack`,
 * `readings` and so on with dates as YYYY-MM-DD.
 */
import { z } from "zod";
import { forecastFaults, packAverageUa, packPeakUa } from "../lib/battery";
import {
  CHEMISTRIES,
  type ForecastInput,
  type PackEvent,
  type PackReading,
} from "../lib/battery/pack";
import { type Fault, invalid } from "../lib/errors";
import { MS_PER_DAY } from "../lib/units";
import { fromCsv, lineOf } from "./forecast-csv";

/** A date, a time of day and a zone, of which the later two may be missing; no zone means UTC. */
const WHEN =
  /^(\d{4}-\d{2}-\d{2})(?:[T ](\d{1,2}:\d{2}(?::\d{2}(?:\.\d+)?)?))?\s*(Z|UTC|GMT|[+-]\d{2}:?\d{2})?$/i;
const GIVE_DATE = "Give a date as 2026-03-31, 2026-03-31 09:30 or 2026-03-31T09:30+02:00.";

function epochMs(text: string): number {
  const [, date, time = "00:00", zone = "Z"] = WHEN.exec(text.trim()) ?? [];
  if (!date) return Number.NaN;
  const offset = /^[+-]/.test(zone) ? zone.replace(/^(...):?(..)$/, "$1:$2") : "Z";
  const ms = Date.parse(`${date}T${time.replace(/^(\d):/, "0$1:")}${offset}`);
  // 30 February would otherwise become 2 March
  return new Date(Date.parse(date)).toISOString().startsWith(date) ? ms : Number.NaN;
}

const day = z.string({ error: GIVE_DATE }).transform((text, context) => {
  const ms = epochMs(text);
  if (Number.isNaN(ms)) {
    context.addIssue(GIVE_DATE);
    return z.NEVER;
  }
  return ms / MS_PER_DAY;
});

/** Told apart because the mend is another: a number is missing, or what stands there is none. */
const amount = z.number({
  error: ({ input }) =>
    input === undefined
      ? "A number is missing here."
      : "Give a plain number without its unit, as 1413 or 1413.5.",
});
const optional = amount.nullable().default(null);

/** One of some words, in any case. */
function word<Word extends string>(words: readonly [Word, ...Word[]]) {
  const error = `Use one of: ${words.join(", ")}.`;
  const lower = (text: unknown): unknown => (typeof text === "string" ? text.toLowerCase() : text);
  return z.preprocess(lower, z.enum(words, { error }));
}

const point = z.object({
  currentUa: amount,
  cutoffMv: amount,
  temperatureDc: amount.default(200),
  capacityMah: amount,
});

const cell = z.object({
  chemistry: word(CHEMISTRIES),
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
  id: z.string().nullish(),
  at: day,
  millivolts: amount,
  kind: word(["resting", "loaded"])
    .nullish()
    .transform((kind) => kind ?? "resting"),
  loadUa: optional,
  temperatureDc: optional,
  accuracyMv: optional,
});

const event = z.object({
  at: day,
  kind: word(["reporting", "stopped", "draw-changed"]),
  lastAliveAt: day.nullish(),
});

const file = z.object(
  {
    pack,
    readings: z.array(reading).nullish(),
    events: z.array(event).nullish(),
    temperatures: z.array(z.object({ at: day, temperatureDc: amount })).nullish(),
    now: day.nullish(),
  },
  { error: 'Give an object: {"pack": {...}, "readings": [...]}.' },
);

/** Read a file's text; throws `invalid` with every fault named, by the file's own names. */
export function readForecastFile(text: string, name: string): ForecastInput {
  const plain = text.replace(/^\uFEFF/, "");
  const isCsv = !/\.json$/i.test(name) && (/\.csv$/i.test(name) || !/^\s*[{[]/.test(plain));
  const named = (faults: readonly Fault[]): Fault[] =>
    isCsv ? faults.map((fault) => ({ ...fault, field: lineOf(fault.field) })) : [...faults];
  const parsed = file.safeParse(isCsv ? fromCsv(plain) : fromJson(plain));
  if (!parsed.success) {
    throw invalid(`${name} cannot be used.`, named(parsed.error.issues.map(toFault)));
  }
  const input = inputOf(parsed.data);
  const faults = [...forecastFaults(input), ...slips(input)];
  if (faults.length > 0) throw invalid(`${name} cannot be used.`, named(faults));
  return { ...input, events: [...input.events, ...lifeSigns(input)] };
}

function inputOf(given: z.infer<typeof file>): ForecastInput {
  const { pack, readings, events, temperatures, now } = given;
  const dated = withIds(readings ?? []);
  const told = (events ?? []).map(({ lastAliveAt, ...e }): PackEvent =>
    typeof lastAliveAt === "number" ? { ...e, lastAliveAt } : e,
  );
  const last = [...dated, ...told].reduce((at, r) => Math.max(at, r.at), pack.installedAt);
  const logged = temperatures ? { temperatures } : {};
  return { pack, readings: dated, events: told, prior: null, now: now ?? last, ...logged };
}

/** Readings without an id are called by their time, told apart where two share it. */
function withIds(readings: readonly z.infer<typeof reading>[]): PackReading[] {
  const taken = new Map<string, number>();
  return readings.map(({ id, ...reading }): PackReading => {
    const name = id ?? timeText(reading.at, reading.at % 1 === 0 ? "day" : "minute");
    const count = (taken.get(name) ?? 0) + 1;
    taken.set(name, count);
    return { id: count > 1 ? `${name} (${count})` : name, ...reading };
  });
}

/** What no forecast is asked with on purpose: another unit, a device that draws nothing. */
function slips({ pack, readings }: ForecastInput): Fault[] {
  const faults: Fault[] = [];
  if (!(packAverageUa(pack) > 0)) {
    const message = "Give the current the device draws, in microamps, above 0.";
    faults.push({ field: "pack.duty.currentUa", message });
  }
  const leastMv = (pack.cell.nominalMv * pack.series) / 100;
  readings.forEach(({ millivolts }, i) => {
    const field = "readings.millivolts";
    if (millivolts < 0) {
      faults.push({ field, row: i + 1, message: "Give a voltage of 0 mV or more." });
    } else if (millivolts > 0 && millivolts < leastMv) {
      const message = `Give millivolts: ${millivolts} mV is next to nothing for this pack.`;
      faults.push({ field, row: i + 1, message });
    }
  });
  return faults;
}

/** How finely a moment is told. */
export type Fineness = "day" | "minute" | "second";

/** A day since the epoch as text, UTC. */
export function timeText(epochDays: number, fineness: Fineness): string {
  const text = new Date(Math.round(epochDays * MS_PER_DAY)).toISOString();
  return text.slice(0, { day: 10, minute: 16, second: 19 }[fineness]).replace("T", " ");
}

/**
 * A voltage above the cut-off under the device's own peak: it ran at that moment. One at the
 * cut-off or below, and none above it later: it had stopped by then.
 */
function lifeSigns({ pack, readings, now }: ForecastInput): PackEvent[] {
  const peak = packPeakUa(pack);
  const judged = readings
    .filter((r) => r.kind === "loaded" && (r.loadUa ?? peak) >= peak)
    .filter((r) => r.at >= pack.installedAt && r.at <= now)
    .sort((a, b) => a.at - b.at);
  const held = judged.filter((r) => r.millivolts > pack.cutoffMv).at(-1);
  if (!held) return [];
  const alive: PackEvent = { at: held.at, kind: "reporting" };
  const failed = judged.filter((r) => r.at > held.at);
  // one low voltage may be a slip
  if (failed.length < 2) return [alive];
  return [alive, { at: failed[0]!.at, kind: "stopped", lastAliveAt: held.at }];
}

function toFault(issue: z.core.$ZodIssue): Fault {
  const row = issue.path.find((part) => typeof part === "number");
  const field = issue.path.filter((part) => typeof part !== "number").join(".") || "file";
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

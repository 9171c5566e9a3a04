import { z } from "zod";
import { appendAudit } from "@/db/queries/audit";
import type { Fault } from "@/lib/errors";
import { logReadings, type ReadingOrder } from "./log-readings";
import { defineUseCase, personIdOf } from "./use-case";

export const LARGEST_BATCH = 1000;

const item = z.object({
  /** Made by the sender; the same id again changes nothing. */
  id: z.uuid("A UUID made by the sender."),
  tag: z.string().min(1, "The asset's tag."),
  at: z.iso.datetime({ offset: true, error: "ISO 8601 with an offset: 2026-12-01T09:30:00Z." }),
  millivolts: z.int("A whole number of millivolts of the whole pack."),
  kind: z.enum(["resting", "loaded"], 'Either "resting" or "loaded".'),
  loadUa: z.int().positive().nullish(),
  temperatureDc: z.int().min(-600).max(1000).nullish(),
  accuracyMv: z.int().positive().max(5000).nullish(),
  instrument: z.string().max(100).nullish(),
  note: z.string().max(2000).nullish(),
});

const input = z.object({
  readings: z
    .array(z.unknown(), "An array of readings.")
    .min(1, "At least one reading.")
    .max(LARGEST_BATCH, `At most ${LARGEST_BATCH} readings a call.`),
});

export interface PostedReading {
  /** Place in the batch, from 0. */
  readonly index: number;
  readonly id: string | null;
  readonly status: "logged" | "repeated" | "refused";
  readonly doubt: string | null;
  readonly faults: readonly Fault[];
}

export interface PostedReadings {
  readonly logged: number;
  readonly repeated: number;
  readonly refused: number;
  readonly results: readonly PostedReading[];
}

/** Logs a batch; each item is judged by itself, and a repeat of the batch changes nothing. */
export const postReadings = defineUseCase({
  name: "post-readings",
  allow: { roles: ["administrator", "dispatcher"], apiScope: "readings:write" },
  input,
  run: async (deps, actor, { readings }): Promise<PostedReadings> => {
    const parsed = readings.map((raw, index) => ({ index, ...parseItem(raw) }));
    const sound = parsed.flatMap((p) => (p.order ? [{ index: p.index, order: p.order }] : []));
    const apiKeyId = actor.kind === "api-key" ? actor.apiKeyId : null;
    const origin = { source: "api" as const, personId: personIdOf(actor), apiKeyId };
    const logged = await deps.db.transaction().execute(async (trx) => {
      const results = await logReadings(
        trx,
        deps,
        sound.map((s) => s.order),
        origin,
      );
      const count = results.filter((r) => r.status === "logged").length;
      if (count > 0) {
        await appendAudit(trx, {
          at: deps.now(),
          personId: origin.personId,
          apiKeyId,
          act: "post-readings",
          subjectKind: "reading",
          subjectId: null,
          detail: { logged: count },
        });
      }
      return results;
    });
    const judged = new Map(sound.map((s, n) => [s.index, logged[n]]));
    return summarise(
      parsed.map((p): PostedReading => {
        const result = judged.get(p.index);
        if (!result) return { ...p, status: "refused", doubt: null };
        const { id, status, doubt, refusal } = result;
        return { index: p.index, id, status, doubt, faults: refusal ? [refusal] : [] };
      }),
    );
  },
});

function summarise(results: readonly PostedReading[]): PostedReadings {
  const count = (status: PostedReading["status"]) =>
    results.filter((r) => r.status === status).length;
  return {
    logged: count("logged"),
    repeated: count("repeated"),
    refused: count("refused"),
    results: results.map(({ index, id, status, doubt, faults }) => ({
      index,
      id,
      status,
      doubt,
      faults,
    })),
  };
}

interface ParsedItem {
  readonly id: string | null;
  readonly order: ReadingOrder | null;
  readonly faults: readonly Fault[];
}

function parseItem(raw: unknown): ParsedItem {
  const parsed = item.safeParse(raw);
  if (!parsed.success) {
    const faults = parsed.error.issues.map((i) => ({
      field: i.path.join("."),
      message: i.message,
    }));
    return { id: readId(raw), order: null, faults };
  }
  const { at, instrument, note, ...rest } = parsed.data;
  const order = {
    ...rest,
    at: new Date(at),
    instrument: instrument ?? "",
    note: note ?? "",
  };
  return { id: rest.id, order, faults: [] };
}

function readId(raw: unknown): string | null {
  const id = typeof raw === "object" && raw !== null && "id" in raw ? raw.id : null;
  return typeof id === "string" ? id : null;
}

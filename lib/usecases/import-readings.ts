import type { ImportRecord } from "@/lib/csv/read-records";
import { type ImportContext, ImportOutcome } from "./import-outcome";
import { checkReadings, logReadings, type ReadingOrder, type ReadingResult } from "./log-readings";
import { naturalId } from "./natural-id";

const CHUNK = 10_000;
const FIELD_OF = { tag: "tag", at: "at", millivolts: "voltage", id: "voltage" } as const;

/**
 * Logs the readings of a file. A reading is known by tag, moment, voltage and kind, so the
 * same file again changes nothing.
 */
export async function importReadings(context: ImportContext): Promise<ImportOutcome> {
  const outcome = new ImportOutcome(context);
  const { trx, deps, records, personId } = context;
  const seen = new Set<string>();
  for (let start = 0; start < records.length; start += CHUNK) {
    const chunk = records.slice(start, start + CHUNK).map((record) => ({
      row: record.row,
      order: asOrder(record),
    }));
    const fresh = chunk.filter(({ row, order }) => {
      const first = !seen.has(order.id);
      if (!first) outcome.settle(row, "same", "stands in an earlier row as well");
      seen.add(order.id);
      return first;
    });
    const orders = fresh.map((f) => f.order);
    const results = context.write
      ? await logReadings(trx, deps, orders, { source: "csv", personId, apiKeyId: null })
      : (await checkReadings(trx, orders, deps.now(), true)).results;
    results.forEach((result, n) => settle(outcome, fresh[n]?.row ?? 0, result));
    await context.progress(start + chunk.length);
  }
  return outcome;
}

function settle(outcome: ImportOutcome, row: number, result: ReadingResult): void {
  if (result.refusal) outcome.refuse(row, FIELD_OF[result.refusal.field], result.refusal.message);
  else if (result.status === "repeated") outcome.settle(row, "same");
  else outcome.settle(row, "new", result.doubt ? `kept, but unlikely: ${result.doubt}` : "");
}

function asOrder({ values }: ImportRecord): ReadingOrder {
  const at = values.at instanceof Date ? values.at : new Date(0);
  const tag = String(values.tag ?? "");
  const millivolts = Number(values.voltage ?? 0);
  const kind = values.kind === "loaded" ? "loaded" : "resting";
  return {
    id: naturalId("reading", tag, at.toISOString(), millivolts, kind),
    ...{ tag, at, millivolts, kind },
    loadUa: kind === "loaded" ? numberOrNull(values.load) : null,
    temperatureDc: numberOrNull(values.temperature),
    accuracyMv: numberOrNull(values.accuracy),
    instrument: String(values.instrument ?? ""),
    note: String(values.note ?? ""),
  };
}

function numberOrNull(value: unknown): number | null {
  return typeof value === "number" ? value : null;
}

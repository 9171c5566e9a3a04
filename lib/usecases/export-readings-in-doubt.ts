import { z } from "zod";
import { listDoubtfulReadings } from "@/db/queries/doubtful-readings";
import { getOrganisation } from "@/db/queries/organisation";
import { formatFor, writeTable } from "@/lib/csv/write-table";
import { defineUseCase } from "./use-case";

const HEAD = [
  ...["tag", "asset", "read at", "volts", "condition", "expected from V", "expected to V"],
  ...["counts %", "marked when logged", "logged by"],
];
const MOST_ROWS = 100_000;

/** Every reading in doubt as CSV. */
export const exportReadingsInDoubt = defineUseCase({
  name: "export-readings-in-doubt",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({}),
  async run(deps) {
    const { locale, timeZone } = await getOrganisation(deps.db);
    const { rows } = await listDoubtfulReadings(deps.db, MOST_ROWS);
    const volts = (mv: number | null) =>
      mv === null ? null : { value: Math.max(0, Math.round(mv)), digits: 3 };
    const lines = rows.map((row) => [
      ...[row.tag, row.assetName, { at: row.at, timeZone }, volts(row.millivolts), row.kind],
      ...[volts(row.expectedLowMv), volts(row.expectedHighMv)],
      row.weight === null ? null : { value: Math.round(row.weight * 1000), digits: 1 },
      ...[row.doubt, row.personName ?? row.apiKeyName ?? row.source],
    ]);
    return writeTable(HEAD, lines, formatFor(locale));
  },
});

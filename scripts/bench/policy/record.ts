/** Writes what a run measured where the Record page reads it. */
import { writeFileSync } from "node:fs";
import { cpus } from "node:os";
import { format } from "prettier";
import type { PolicyName, PolicyOutcome, PolicyRecord } from "@/lib/present/policy-record";
import { CAUSES, type Result } from "./ledger";
import { means } from "./table";

const FILE = new URL("../../../lib/present/policy-record.json", import.meta.url);

const rounded = (value: number, digits = 4) => Number(value.toFixed(digits));

function outcome(result: Result): PolicyOutcome {
  const causes = CAUSES.map((cause) => [cause, rounded(result.byCause[cause] / 100)]);
  return {
    policy: result.policy as PolicyName,
    pounds: rounded(result.costPerDeviceYear),
    deadHours: rounded(result.deadHoursPerDeviceYear),
    visits: rounded(result.visitsPerDeviceYear),
    kilometres: rounded(result.kmPerDeviceYear),
    swaps: rounded(result.swapsPerDeviceYear),
    stops: rounded(result.stopsPerDeviceYear),
    urgentTrips: rounded(result.urgentPerDeviceYear),
    reads: rounded(result.readsPerDeviceYear),
    wastedShare: rounded(result.wastedAhShare),
    poundsByCause: Object.fromEntries(causes) as PolicyOutcome["poundsByCause"],
  };
}

export type Measured = Pick<PolicyRecord, "command" | "assets" | "years" | "seeds" | "setOn">;

/** Overwrites the record with the results of one run, every policy and seed of it. */
export async function writeRecord(measured: Measured, results: readonly Result[]): Promise<void> {
  const record: PolicyRecord = {
    ...measured,
    machine: `${cpus().length} processors, Node ${process.versions.node}`,
    measuredOn: new Date().toISOString().slice(0, 10),
    means: means(results).map(outcome),
    bySeed: results.map((result) => ({ seed: result.seed, ...outcome(result) })),
  };
  const options = { parser: "json", printWidth: 100 };
  writeFileSync(FILE, await format(JSON.stringify(record), options));
}

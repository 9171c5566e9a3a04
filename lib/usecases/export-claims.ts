import { z } from "zod";
import { formatFor, writeTable } from "@/lib/csv/write-table";
import { heldSince, trustInput } from "./read-trust";
import { defineUseCase } from "./use-case";

const HEAD = [
  ...["quarter", "tag", "device model", "crew", "cell type", "installed at", "said 5 %"],
  ...["said likely", "said 95 %", "ended at", "how", "came out at", "reason", "chance by then %"],
];

/** Every forecast that the Record judges, with what has come of it, as CSV. */
export const exportClaims = defineUseCase({
  name: "export-claims",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ days: trustInput.shape.days, crew: trustInput.shape.crew }),
  async run(deps, _actor, input) {
    const { organisation, held } = await heldSince(deps, input);
    const { locale, timeZone } = organisation;
    const at = (moment: Date | null) => (moment ? { at: moment, timeZone } : null);
    const rows = held.map((claim) => [
      ...[claim.quarter, claim.tag, claim.modelName, claim.crewName, claim.designation],
      ...[at(claim.installedAt), at(claim.window.p05), at(claim.window.p50)],
      ...[at(claim.window.p95), at(claim.endedAt), howEnded(claim), at(claim.removedAt)],
      ...[claim.reasonOut, { value: Math.round(claim.life.chance * 1000), digits: 1 }],
    ]);
    return writeTable(HEAD, rows, formatFor(locale));
  },
});

function howEnded(claim: { readonly endedAt: Date | null; readonly stopped: boolean }): string {
  if (claim.endedAt === null) return "still running";
  return claim.stopped ? "stopped" : "taken out alive";
}

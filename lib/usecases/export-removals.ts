import { z } from "zod";
import { getOrganisation } from "@/db/queries/organisation";
import { listOutcomes } from "@/db/queries/outcomes";
import { formatFor, writeTable } from "@/lib/csv/write-table";
import { MS_PER_DAY } from "@/lib/units";
import { trustInput } from "./read-trust";
import { defineUseCase } from "./use-case";

const HEAD = [
  ...["tag", "device model", "crew", "cell type", "installed at", "came out at", "reason"],
  ...["stopped at", "said 5 %", "said likely", "said 95 %", "chance by then %", "left %"],
];

/** Every removal that the Record judges, with the forecast it is held against, as CSV. */
export const exportRemovals = defineUseCase({
  name: "export-removals",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({ days: trustInput.shape.days, crew: trustInput.shape.crew }),
  async run(deps, _actor, { days, crew }) {
    const { locale, timeZone } = await getOrganisation(deps.db);
    const since = new Date(deps.now().getTime() - days * MS_PER_DAY);
    const all = { chemistry: null, deviceModelId: null };
    const lines = await listOutcomes(deps.db, { since, crewId: crew, ...all });
    const at = (moment: Date | null) => (moment ? { at: moment, timeZone } : null);
    const permille = (value: number) => ({ value, digits: 1 });
    const rows = lines.map((row) => [
      ...[row.tag, row.modelName, row.crewName, row.designation, at(row.installedAt)],
      ...[at(row.removedAt), row.reasonOut, at(row.stoppedAt)],
      ...[at(row.p05), at(row.p50), at(row.p95)],
      ...[permille(row.chanceStoppedPermille), permille(row.shareLeftPermille)],
    ]);
    return writeTable(HEAD, rows, formatFor(locale));
  },
});

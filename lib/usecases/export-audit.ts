import { getOrganisation } from "@/db/queries/organisation";
import { formatFor, writeTable } from "@/lib/csv/write-table";
import { allPages } from "./all-pages";
import { listAudit } from "./list-audit";
import { defineUseCase } from "./use-case";

const HEAD = ["at", "person", "API key", "act", "kind", "subject", "besides"];

/** Who did what as shown, all pages, as CSV. */
export const exportAudit = defineUseCase({
  name: "export-audit",
  allow: listAudit.definition.allow,
  input: listAudit.definition.input,
  async run(deps, actor, input) {
    const { locale, timeZone } = await getOrganisation(deps.db);
    const entries = await allPages((page) => listAudit(deps, actor, { ...input, page }));
    const rows = entries.map((row) => [
      ...[{ at: row.at, timeZone }, row.personName, row.apiKeyName, row.act, row.subjectKind],
      ...[row.subjectLabel ?? row.subjectId, JSON.stringify(row.detail)],
    ]);
    return writeTable(HEAD, rows, formatFor(locale));
  },
});

import { getOrganisation } from "@/db/queries/organisation";
import { formatFor, writeTable } from "@/lib/csv/write-table";
import { allPages } from "./all-pages";
import { listMails } from "./list-mails";
import { defineUseCase } from "./use-case";

const HEAD = ["to", "subject", "kind", "state", "attempts", "trouble", "ordered at", "sent at"];

/** The mail log as shown, all pages, as CSV; never what the mails said. */
export const exportMails = defineUseCase({
  name: "export-mails",
  allow: listMails.definition.allow,
  input: listMails.definition.input,
  async run(deps, actor, input) {
    const { locale, timeZone } = await getOrganisation(deps.db);
    const mails = await allPages((page) => listMails(deps, actor, { ...input, page }));
    const at = (moment: Date | null) => (moment ? { at: moment, timeZone } : null);
    const rows = mails.map((row) => [
      ...[row.toEmail, row.subject, row.template, row.state, String(row.attempts)],
      ...[row.lastError, at(row.createdAt), at(row.sentAt)],
    ]);
    return writeTable(HEAD, rows, formatFor(locale));
  },
});

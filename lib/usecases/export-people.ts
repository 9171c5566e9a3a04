import { getOrganisation } from "@/db/queries/organisation";
import { formatFor, writeTable } from "@/lib/csv/write-table";
import { allPages } from "./all-pages";
import { listPeople } from "./list-people";
import { defineUseCase } from "./use-case";

const HEAD = ["name", "mail address", "roles", "state", "invited at", "last seen at"];

/** The people as shown, all pages, as CSV. */
export const exportPeople = defineUseCase({
  name: "export-people",
  allow: listPeople.definition.allow,
  input: listPeople.definition.input,
  async run(deps, actor, input) {
    const { locale, timeZone } = await getOrganisation(deps.db);
    const people = await allPages((page) => listPeople(deps, actor, { ...input, page }));
    const at = (moment: Date | null) => (moment ? { at: moment, timeZone } : null);
    const rows = people.map((row) => [
      ...[row.name, row.email, row.roles.join(" "), row.state],
      ...[at(row.invitedAt), at(row.lastSeenAt)],
    ]);
    return writeTable(HEAD, rows, formatFor(locale));
  },
});

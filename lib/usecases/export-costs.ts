import { formatFor, writeTable } from "@/lib/csv/write-table";
import { readCosts } from "./read-costs";
import { defineUseCase } from "./use-case";

const HEAD = [
  ...["month", "came out", "early", "when due", "had stopped", "silent hours", "rounds"],
  ...["driven km", "cells", "crew", "driving"],
];

/** What swapping cost by month, as CSV; money in the organisation's currency. */
export const exportCosts = defineUseCase({
  name: "export-costs",
  allow: readCosts.definition.allow,
  input: readCosts.definition.input,
  async run(deps, actor, input) {
    const { months, organisation } = await readCosts(deps, actor, input);
    const whole = (value: number) => ({ value: Math.round(value), digits: 0 });
    const money = (minor: number) => ({ value: Math.round(minor), digits: 2 });
    const rows = months.map((row) => [
      ...[row.month, whole(row.removals), whole(row.early), whole(row.due), whole(row.stopped)],
      ...[whole(row.silentHours), whole(row.rounds), whole(row.kilometres)],
      ...[money(row.cellsMinor), money(row.crewMinor), money(row.travelMinor)],
    ]);
    return writeTable(HEAD, rows, formatFor(organisation.locale));
  },
});

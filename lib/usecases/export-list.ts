import { z } from "zod";
import { getOrganisation } from "@/db/queries/organisation";
import { formatFor, writeTable } from "@/lib/csv/write-table";
import { assetTable, siteTable } from "./export-register";
import { installTable, readingTable } from "./export-service";
import { cellTypeTable, deviceModelTable } from "./export-catalogue";
import { lotTable, moveTable } from "./export-stores";
import { assetListInput } from "./list-assets";
import { siteListInput } from "./list-sites";
import type { ExportContext, OutTable } from "./export-table";
import { defineUseCase } from "./use-case";

const TABLES = {
  assets: assetTable,
  sites: siteTable,
  installs: installTable,
  readings: readingTable,
  "cell-types": cellTypeTable,
  "device-models": deviceModelTable,
  lots: lotTable,
  moves: moveTable,
} as const satisfies Record<string, (context: ExportContext) => Promise<OutTable>>;

/**
 * A list as CSV, as it is shown: under the same filters and order, all pages. The heads are
 * those an import knows, so that a file that went out comes in again.
 */
export const exportList = defineUseCase({
  name: "export-list",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: z.object({
    list: z.enum(Object.keys(TABLES) as [keyof typeof TABLES], "There is no such list."),
    assets: assetListInput,
    sites: siteListInput,
  }),
  run: async (deps, _actor, { list, assets, sites }) => {
    const { locale, timeZone } = await getOrganisation(deps.db);
    const format = formatFor(locale);
    const context = { deps, timeZone, decimal: format.decimal, assets, sites };
    const { head, rows } = await TABLES[list](context);
    const day = deps.now().toISOString().slice(0, 10);
    return { name: `${list}-${day}`, text: writeTable(head, rows, format) };
  },
});

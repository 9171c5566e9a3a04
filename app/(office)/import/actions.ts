"use server";

import { revalidatePath } from "next/cache";
import { defineAction } from "@/lib/server/define-action";
import { applyImport, checkImport } from "@/lib/usecases/change-import";
import { text } from "../fleet/_parts/form-entries";

const renew = ({ importId }: { importId: string }) => revalidatePath(`/import/${importId}`);

/** Fields "column.<key>" hold a column's number, "unit.<key>" the unit it is in. */
function readColumns(form: FormData) {
  const columns: Record<string, { column: number; unit: string | null }> = {};
  for (const [name, value] of form.entries()) {
    const key = /^column\.(\w+)$/.exec(name)?.[1];
    if (!key || value === "") continue;
    columns[key] = { column: Number(value), unit: text(form, `unit.${key}`) || null };
  }
  return columns;
}

const DELIMITERS: Record<string, string> = { comma: ",", semicolon: ";", tab: "\t" };

export const checkImportAction = defineAction(
  checkImport,
  (form) => ({
    importId: text(form, "importId"),
    delimiter: DELIMITERS[text(form, "delimiter")] as never,
    decimal: text(form, "decimal") as never,
    dayOrder: text(form, "dayOrder") as never,
    closePrevious: form.has("closePrevious"),
    columns: readColumns(form),
  }),
  renew,
);
export const applyImportAction = defineAction(
  applyImport,
  (form) => ({ importId: text(form, "importId") }),
  renew,
);

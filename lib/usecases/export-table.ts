import type { z } from "zod";
import type { OutCell } from "@/lib/csv/write-table";
import type { assetListInput } from "./list-assets";
import type { siteListInput } from "./list-sites";
import type { Deps } from "./use-case";

/** What a table is made with. */
export interface ExportContext {
  readonly deps: Deps;
  readonly timeZone: string;
  readonly decimal: "." | ",";
  readonly assets: z.output<typeof assetListInput>;
  readonly sites: z.output<typeof siteListInput>;
}

export interface OutTable {
  readonly head: readonly string[];
  readonly rows: readonly (readonly OutCell[])[];
}

/** An integer of a finer unit as a decimal cell; nothing stays empty. */
export function scaled(value: number | null, digits = 0): OutCell {
  return value === null ? null : { value, digits };
}

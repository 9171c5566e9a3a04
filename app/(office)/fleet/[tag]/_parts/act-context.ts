import type { SwapChoices } from "@/lib/usecases/read-asset";

/** What the forms of an asset need to know; plain data, as it goes to the browser. */
export interface ActContext {
  readonly assetId: string;
  readonly tag: string;
  /** Local time now, as a form writes it: 2026-12-01T09:30. */
  readonly now: string;
  readonly packId: string | null;
  readonly series: number;
  readonly parallel: number;
  readonly choices: SwapChoices;
}

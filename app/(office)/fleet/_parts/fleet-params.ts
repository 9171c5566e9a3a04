import type { z } from "zod";
import type { assetListInput } from "@/lib/usecases/list-assets";
import type { siteListInput } from "@/lib/usecases/list-sites";

/** A list's address: search, filters, order and page live in it. */
export type ListParams = Record<string, string | undefined>;

/** What stands in the address of the fleet; what makes no sense falls back in the use case. */
export function readAssetParams(params: ListParams): z.input<typeof assetListInput> {
  return {
    search: params.q ?? "",
    modelId: params.model ?? null,
    chemistry: (params.chemistry ?? null) as never,
    state: (params.state ?? null) as never,
    crewId: params.crew ?? null,
    siteCode: params.site ?? null,
    order: (params.order ?? "tag") as never,
    descending: params.dir === "desc",
    page: params.page ?? "1",
  };
}

export function readSiteParams(params: ListParams): z.input<typeof siteListInput> {
  return {
    search: params.q ?? "",
    crewId: params.crew ?? null,
    order: (params.order ?? "code") as never,
    descending: params.dir === "desc",
    page: params.page ?? "1",
  };
}
